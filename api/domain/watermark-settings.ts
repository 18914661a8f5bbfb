/** How the studio's name is laid over its proofs. */
export interface WatermarkSettings {
  kind: 'none' | 'text' | 'image';
  /** The words, where kind is text. */
  text: string;
  /** Storage key of an uploaded PNG, where kind is image. */
  imageKey?: string | null;
  /** 0 to 1. */
  opacity: number;
  /** Share of the picture's width that one mark takes, 0.1 to 1. */
  size: number;
  tiled: boolean;
}

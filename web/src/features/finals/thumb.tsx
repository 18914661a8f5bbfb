import { Picture } from '../../ui/picture.tsx';

interface Props {
  picture: string | null | undefined;
  medium?: string | null | undefined;
  width: number;
  height: number;
  placeholder: string | null;
  /** What it shows; empty where the words beside it say so. */
  alt?: string;
  /** The box it is fitted into, CSS pixels. */
  box?: { width: number; height: number };
}

/**
 * A small picture in its own proportions, fitted into a box, so that rows of a table are of one height. In a narrow window it is smaller, so that
 * the other columns keep their words whole.
 */
export function Thumb({ picture, medium, width, height, placeholder, alt = '', box = { width: 120, height: 80 } }: Props) {
  const drawn = Math.min(box.width, (box.height * width) / height);
  return (
    <span className="block shrink-0" style={{ width: `min(${drawn}px, max(72px, 10vw))` }}>
      <Picture source={{ small: picture, medium, width, height, thumbhash: placeholder }} alt={alt} drawnWidth={drawn} />
    </span>
  );
}

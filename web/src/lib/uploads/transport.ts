/** What the server is told about a file before a byte of it is sent. */
export interface Offer {
  name: string;
  /** Bytes. */
  size: number;
  /** Lower-case hex. */
  sha256: string;
  /** Milliseconds since the epoch, as the file system says. */
  lastModified: number;
}

/** The server's answer to an offer: it has the file already, has all of it and checks it, or awaits the missing parts. */
export type OfferAnswer =
  | { kind: 'known'; sentence: string }
  | { kind: 'checking'; uploadId: string }
  | { kind: 'upload'; uploadId: string; partSize: number; partsThere: number[] };

/** How the server's check of a whole file stands. */
export interface CheckState {
  uploadId: string;
  state: 'checking' | 'done' | 'failed';
  /** The sentence that says why, where it failed. */
  problem?: string;
}

/** The requests that the queue makes. Each rejects with a {@link TransportProblem} or an AbortError. */
export interface UploadTransport {
  offer(offer: Offer, signal: AbortSignal): Promise<OfferAnswer>;
  /** Sends part `number` (from 1); `onProgress` is told the bytes of the part that have left. */
  putPart(uploadId: string, number: number, bytes: Blob, onProgress: (loaded: number) => void, signal: AbortSignal): Promise<void>;
  complete(uploadId: string, signal: AbortSignal): Promise<void>;
  /** The state of each upload asked for; one that the server does not name is still being checked. */
  check(uploadIds: string[], signal: AbortSignal): Promise<CheckState[]>;
  /** Tells the server that nothing more will come. Never rejects for an upload that is gone. */
  abandon(uploadId: string): Promise<void>;
}

/**
 * Why a request failed:
 * `line` no answer came; `busy` the server asks to wait (429, 502, 503, 504); `server` it broke over this request;
 * `gone` it does not know this upload any more; `signed-out` it does not know who asks; `refused` it will not, and says why.
 */
export type ProblemKind = 'line' | 'busy' | 'server' | 'gone' | 'signed-out' | 'refused';

/** A request of the queue that failed, with a sentence for the person who uploads. */
export class TransportProblem extends Error {
  readonly kind: ProblemKind;
  /** How long the server asked to wait, in milliseconds. */
  readonly waitMs: number | undefined;

  constructor(kind: ProblemKind, sentence: string, waitMs?: number) {
    super(sentence);
    this.name = 'TransportProblem';
    this.kind = kind;
    this.waitMs = waitMs;
  }
}

/**
 * Where a file stands.
 * `held` an upload of an earlier visit whose file must be opened or chosen again; `waiting` in the queue; `reading` its
 * SHA-256 is being computed; `sending` its parts are going out; `retrying` a request failed and will be made again;
 * `checking` the server compares and looks; `done`, `known` (the commission had it already), `failed`, `left-out` (junk).
 */
export type UploadState = 'held' | 'waiting' | 'reading' | 'sending' | 'retrying' | 'checking' | 'done' | 'known' | 'failed' | 'left-out';

/** What the page sees of one file. A new object whenever something of it changed. */
export interface UploadView {
  id: string;
  name: string;
  /** With the folders above it. */
  path: string;
  /** Bytes. */
  size: number;
  /** Bytes that are with the server or have left for it. */
  sent: number;
  state: UploadState;
  /** A sentence: why it failed, was left out, is waited for. */
  problem?: string;
}

/** Where a file stands inside the queue; finer than what the page is shown. */
export type Stage = 'held' | 'new' | 'reading' | 'read' | 'open' | 'checking' | 'done' | 'known' | 'failed' | 'left-out';

/** One file in the queue: its bytes are never held, only the File that reads them. */
export class UploadItem {
  file: File | undefined;
  handle: FileSystemFileHandle | undefined;
  root: FileSystemDirectoryHandle | undefined;
  stage: Stage = 'new';
  sha256: string | undefined;
  uploadId: string | undefined;
  partSize = 0;
  readonly partsThere = new Set<number>();
  /** Bytes that have left, by the part that is under way. */
  readonly partsFlying = new Map<number, number>();
  /** The file's one request that is not a part (offer, complete) is under way. */
  asking = false;
  /** Which parts are there is not certain: ask before sending on. */
  unsure = false;
  /** Times in a row that the server broke over this file. */
  failures = 0;
  /** Nothing is asked for this file before this moment. */
  notBefore = 0;
  problem: string | undefined;
  /** The same picture, which is on its way already. */
  twinOf: UploadItem | undefined;
  /** Ends the requests of this file. */
  stop = new AbortController();

  constructor(
    readonly id: string,
    readonly name: string,
    readonly path: string,
    readonly size: number,
    readonly lastModified: number,
  ) {}

  /** How many parts the file has once the server has said how large they are. */
  get partCount(): number {
    return this.partSize > 0 ? Math.ceil(this.size / this.partSize) : 0;
  }

  /** Bytes of part `number` (from 1). */
  bytesOf(number: number): number {
    return Math.min(this.partSize, this.size - (number - 1) * this.partSize);
  }

  /** The lowest part that is neither there nor under way. */
  nextPart(): number | undefined {
    for (let number = 1; number <= this.partCount; number += 1) {
      if (!this.partsThere.has(number) && !this.partsFlying.has(number)) return number;
    }
    return undefined;
  }

  /** Every part is with the server. */
  get allThere(): boolean {
    return this.partCount > 0 && this.partsThere.size === this.partCount;
  }

  /** Bytes with the server or on their way. */
  get sent(): number {
    if (this.stage === 'checking' || this.stage === 'done' || this.stage === 'known') return this.size;
    let bytes = 0;
    for (const number of this.partsThere) bytes += this.bytesOf(number);
    for (const loaded of this.partsFlying.values()) bytes += loaded;
    return Math.min(bytes, this.size);
  }

  /** The server does not know the upload any more: everything has to be sent again. */
  forgetParts(): void {
    this.uploadId = undefined;
    this.partsThere.clear();
  }

  /** Ends what is under way and makes the item ready for new requests. */
  halt(): void {
    this.stop.abort();
    this.stop = new AbortController();
    this.partsFlying.clear();
    this.asking = false;
  }

  /** What the page is shown. */
  view(): UploadView {
    const state = this.#state();
    return {
      id: this.id,
      name: this.name,
      path: this.path,
      size: this.size,
      sent: this.sent,
      state,
      ...(this.problem === undefined ? {} : { problem: this.problem }),
    };
  }

  #state(): UploadState {
    switch (this.stage) {
      case 'new':
      case 'read':
        return this.problem === undefined ? 'waiting' : 'retrying';
      case 'open':
        return this.problem === undefined ? 'sending' : 'retrying';
      default:
        return this.stage;
    }
  }
}

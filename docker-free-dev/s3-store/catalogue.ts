import path from 'node:path';
import type { Entry, Piece, StoredObject, Upload } from './entries.ts';
import { Journal } from './journal.ts';

export interface Bucket {
  created: number;
  objects: Map<string, StoredObject>;
  /** Keys in the byte order S3 lists them in; made when asked for, forgotten when a key comes or goes. */
  sorted: string[] | null;
}

const blobsOf = (pieces: Piece[]): string[] => pieces.map((piece) => piece.blob);

// UTF-16 order, which < compares by, differs from byte order only where surrogates meet U+E000 and above.
function byBytes(a: string, b: string): number {
  if (/[\ud800-\uffff]/.test(a) || /[\ud800-\uffff]/.test(b)) return Buffer.compare(Buffer.from(a), Buffer.from(b));
  return a < b ? -1 : a > b ? 1 : 0;
}

/** What is in the store: buckets, objects and unfinished uploads, in memory and in the journal. */
export class Catalogue {
  readonly buckets = new Map<string, Bucket>();
  readonly uploads = new Map<string, Upload>();
  private readonly journal: Journal;

  constructor(dir: string, sync: boolean) {
    this.journal = new Journal(path.join(dir, 'journal.jsonl'), sync);
  }

  /** Brings back the state of the last run and shortens the journal. */
  async load(): Promise<void> {
    for await (const entry of this.journal.replay()) this.apply(entry);
    this.journal.rewrite(this.entries());
  }

  /** Makes a change and remembers it. @returns blobs that nothing refers to any more */
  record(entry: Entry): string[] {
    this.journal.append(entry);
    return this.apply(entry);
  }

  close(): void {
    this.journal.close();
  }

  sortedKeys(bucket: Bucket): string[] {
    bucket.sorted ??= [...bucket.objects.keys()].sort(byBytes);
    return bucket.sorted;
  }

  /** Every blob that something refers to. */
  blobs(): Set<string> {
    const named = new Set<string>();
    for (const bucket of this.buckets.values()) {
      for (const object of bucket.objects.values()) for (const piece of object.pieces) named.add(piece.blob);
    }
    for (const upload of this.uploads.values()) for (const part of upload.parts.values()) named.add(part.piece.blob);
    return named;
  }

  private *entries(): Generator<Entry> {
    for (const [bucket, { created, objects }] of this.buckets) {
      yield { does: 'make-bucket', bucket, created };
      for (const [key, object] of objects) yield { does: 'put', bucket, key, object };
    }
    for (const { parts, ...upload } of this.uploads.values()) {
      yield { does: 'begin', upload };
      for (const part of parts.values()) yield { does: 'part', upload: upload.id, part };
    }
  }

  private apply(entry: Entry): string[] {
    switch (entry.does) {
      case 'make-bucket':
        this.buckets.set(entry.bucket, { created: entry.created, objects: new Map(), sorted: null });
        return [];
      case 'remove-bucket':
        this.buckets.delete(entry.bucket);
        return [];
      case 'put':
        return this.setObject(entry.bucket, entry.key, entry.object);
      case 'delete':
        return this.setObject(entry.bucket, entry.key, null);
      case 'begin':
        this.uploads.set(entry.upload.id, { ...entry.upload, parts: new Map() });
        return [];
      case 'part':
        return this.setPart(entry);
      case 'complete':
      case 'abort':
        return this.endUpload(entry);
    }
  }

  private setObject(bucketName: string, key: string, object: StoredObject | null): string[] {
    const bucket = this.buckets.get(bucketName);
    if (!bucket) return [];
    const before = bucket.objects.get(key);
    if (object) bucket.objects.set(key, object);
    else bucket.objects.delete(key);
    if (Boolean(before) !== Boolean(object)) bucket.sorted = null;
    return before ? blobsOf(before.pieces) : [];
  }

  private setPart({ upload: id, part }: Extract<Entry, { does: 'part' }>): string[] {
    const upload = this.uploads.get(id);
    const before = upload?.parts.get(part.number);
    upload?.parts.set(part.number, part);
    return before ? [before.piece.blob] : [];
  }

  private endUpload(entry: Extract<Entry, { does: 'complete' | 'abort' }>): string[] {
    const upload = this.uploads.get(entry.upload);
    if (!upload) return [];
    this.uploads.delete(upload.id);
    const blobs = [...upload.parts.values()].map((part) => part.piece.blob);
    if (entry.does === 'abort') return blobs;
    const replaced = this.setObject(upload.bucket, upload.key, entry.object);
    const kept = new Set(blobsOf(entry.object.pieces));
    return [...replaced, ...blobs.filter((blob) => !kept.has(blob))];
  }
}

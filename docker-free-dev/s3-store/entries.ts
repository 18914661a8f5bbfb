/** A stretch of an object's bytes; an object of several parts keeps them as they came, so completing copies nothing. */
export interface Piece {
  blob: string;
  size: number;
}

export interface Checksum {
  /** Lower case, as in the header's name: crc32, crc32c, sha1, sha256. */
  algorithm: string;
  /** base64 */
  value: string;
}

export interface StoredObject {
  pieces: Piece[];
  /** bytes */
  size: number;
  /** Without quotation marks: md5 in hex, or md5 of the parts' md5s and "-" and their number. */
  etag: string;
  /** milliseconds, whole seconds as HTTP dates are */
  modified: number;
  /** content-type and its like, and x-amz-meta-; values as they came over the wire (latin1) */
  headers: Record<string, string>;
  checksum?: Checksum;
}

export interface Part {
  number: number;
  piece: Piece;
  etag: string;
  modified: number;
}

export interface Upload {
  id: string;
  bucket: string;
  key: string;
  begun: number;
  headers: Record<string, string>;
  parts: Map<number, Part>;
}

/** One change of the store's state; the journal is the list of them. */
export type Entry =
  | { does: 'make-bucket'; bucket: string; created: number }
  | { does: 'remove-bucket'; bucket: string }
  | { does: 'put'; bucket: string; key: string; object: StoredObject }
  | { does: 'delete'; bucket: string; key: string }
  | { does: 'begin'; upload: Omit<Upload, 'parts'> }
  | { does: 'part'; upload: string; part: Part }
  | { does: 'complete'; upload: string; object: StoredObject }
  | { does: 'abort'; upload: string };

import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Proof } from './authentication.ts';
import type { Blobs } from './blobs.ts';
import type { Bucket, Catalogue } from './catalogue.ts';
import { cutLine, type Fault } from './faults.ts';
import { StoreError } from './store-error.ts';
import { document, type XmlChild } from './xml.ts';

/** One proven request and everything needed to serve it. */
export interface Call {
  req: IncomingMessage;
  res: ServerResponse;
  method: string;
  /** Empty for the list of buckets. */
  bucket: string;
  /** Empty for the bucket itself. */
  key: string;
  query: Map<string, string>;
  proof: Proof;
  fault: Fault | undefined;
  catalogue: Catalogue;
  blobs: Blobs;
  region: string;
}

/** A header's value; presigned addresses carry x-amz- headers in the query instead. */
export function headerOf(call: Call, name: string): string | undefined {
  const value = call.req.headers[name];
  if (value !== undefined) return Array.isArray(value) ? value.join(',') : value;
  if (!name.startsWith('x-amz-')) return undefined;
  for (const [key, text] of call.query) if (key.toLowerCase() === name) return Buffer.from(text, 'utf8').toString('latin1');
  return undefined;
}

/** @throws StoreError where there is no such bucket */
export function bucketOf(call: Call): Bucket {
  const bucket = call.catalogue.buckets.get(call.bucket);
  if (!bucket) throw new StoreError(404, 'NoSuchBucket', 'The specified bucket does not exist.');
  return bucket;
}

/** Sends the head of an answer; false where a fault swallowed the answer. */
export function sendHead(call: Call, status: number, headers: Record<string, string | number> = {}): boolean {
  if (call.fault?.loseAnswer) {
    cutLine(call.req);
    return false;
  }
  call.res.writeHead(status, headers);
  return true;
}

/** Answers without a body. */
export function sendEmpty(call: Call, status: number, headers: Record<string, string | number> = {}): void {
  if (sendHead(call, status, headers)) call.res.end();
}

/** Answers with an XML document. */
export function sendXml(call: Call, root: string, children: XmlChild[]): void {
  const text = document(root, children);
  const headers = { 'content-type': 'application/xml', 'content-length': Buffer.byteLength(text) };
  if (sendHead(call, 200, headers)) call.res.end(text);
}

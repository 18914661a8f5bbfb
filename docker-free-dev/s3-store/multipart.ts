import { createHash, randomBytes } from 'node:crypto';
import { receiveBlob, receiveText } from './body.ts';
import { bucketOf, type Call, sendEmpty, sendXml } from './call.ts';
import { requireWritable } from './conditions.ts';
import type { Part, StoredObject, Upload } from './entries.ts';
import { keptHeaders } from './object-headers.ts';
import { thisSecond } from './objects.ts';
import { StoreError } from './store-error.ts';
import { inner, text, type XmlChild } from './xml.ts';

/** AWS S3 user guide, "Amazon S3 multipart upload limits": parts 1 to 10,000, all but the last at least 5 MiB. */
const HIGHEST_PART = 10_000;
const SMALLEST_PART = 5 * 1024 * 1024;
const PAGE = 1000;

/** @throws StoreError where the upload is unknown, done or given up */
function uploadOf(call: Call): Upload {
  bucketOf(call);
  const upload = call.catalogue.uploads.get(call.query.get('uploadId') ?? '');
  if (!upload || upload.bucket !== call.bucket || upload.key !== call.key) {
    throw new StoreError(404, 'NoSuchUpload', 'The upload does not exist, or was completed or aborted.');
  }
  return upload;
}

export function createUpload(call: Call): void {
  bucketOf(call);
  call.req.resume();
  const id = randomBytes(24).toString('base64url');
  const upload = { id, bucket: call.bucket, key: call.key, begun: Date.now(), headers: keptHeaders(call) };
  call.catalogue.record({ does: 'begin', upload });
  sendXml(call, 'InitiateMultipartUploadResult', [
    ['Bucket', call.bucket],
    ['Key', call.key],
    ['UploadId', id],
  ]);
}

export async function uploadPart(call: Call): Promise<void> {
  uploadOf(call);
  const number = Number(call.query.get('partNumber'));
  if (!(Number.isInteger(number) && number >= 1 && number <= HIGHEST_PART)) {
    throw new StoreError(400, 'InvalidArgument', 'Part number must be an integer between 1 and 10000.');
  }
  if (call.req.headers['x-amz-copy-source']) throw new StoreError(501, 'NotImplemented', 'Copying into a part is not supported.');
  const { blob, size, md5, checksum } = await receiveBlob(call);
  try {
    // The upload may have been completed or given up while the part was coming in.
    const { id } = uploadOf(call);
    const part: Part = { number, piece: { blob, size }, etag: md5, modified: thisSecond() };
    call.blobs.remove(call.catalogue.record({ does: 'part', upload: id, part }));
  } catch (error) {
    call.blobs.remove([blob]);
    throw error;
  }
  const sums = checksum ? { [`x-amz-checksum-${checksum.algorithm}`]: checksum.value } : {};
  sendEmpty(call, 200, { etag: `"${md5}"`, ...sums });
}

/** The parts named by the client, in order, each as it was uploaded. */
function chosenParts(upload: Upload, request: string): Part[] {
  const named = inner(request, 'Part').map((part) => ({
    number: Number(text(part, 'PartNumber')),
    etag: (text(part, 'ETag') ?? '').replaceAll('"', ''),
  }));
  if (named.length === 0) throw new StoreError(400, 'MalformedXML', 'At least one part must be named.');
  const ascending = named.every(({ number }, index) => index === 0 || number > (named[index - 1]?.number ?? 0));
  if (!ascending) throw new StoreError(400, 'InvalidPartOrder', 'Parts must be named in ascending order.');
  return named.map(({ number, etag }, index) => {
    const part = upload.parts.get(number);
    if (!part || part.etag !== etag) throw new StoreError(400, 'InvalidPart', `Part ${number} was not uploaded, or has another ETag.`);
    if (index < named.length - 1 && part.piece.size < SMALLEST_PART) {
      throw new StoreError(400, 'EntityTooSmall', `Part ${number} is smaller than 5 MiB and not the last.`);
    }
    return part;
  });
}

/** ETag of an object of parts: md5 over the parts' binary md5s, and their number. */
export function multipartEtag(etags: string[]): string {
  const joined = Buffer.concat(etags.map((etag) => Buffer.from(etag, 'hex')));
  return `${createHash('md5').update(joined).digest('hex')}-${etags.length}`;
}

export async function completeUpload(call: Call): Promise<void> {
  const request = await receiveText(call);
  // From here to the record nothing waits, so two completions cannot both succeed.
  const upload = uploadOf(call);
  const parts = chosenParts(upload, request);
  requireWritable(call.req.headers, bucketOf(call).objects.get(call.key));
  const object: StoredObject = {
    pieces: parts.map((part) => part.piece),
    size: parts.reduce((sum, part) => sum + part.piece.size, 0),
    etag: multipartEtag(parts.map((part) => part.etag)),
    modified: thisSecond(),
    headers: upload.headers,
  };
  call.blobs.remove(call.catalogue.record({ does: 'complete', upload: upload.id, object }));
  sendXml(call, 'CompleteMultipartUploadResult', [
    ['Bucket', call.bucket],
    ['Key', call.key],
    ['ETag', `"${object.etag}"`],
  ]);
}

export function abortUpload(call: Call): void {
  const { id } = uploadOf(call);
  call.blobs.remove(call.catalogue.record({ does: 'abort', upload: id }));
  sendEmpty(call, 204);
}

function pageSize(call: Call, name: string): number {
  const size = Number(call.query.get(name) ?? PAGE);
  if (!(Number.isInteger(size) && size >= 0)) throw new StoreError(400, 'InvalidArgument', `${name} must be a number.`);
  return Math.min(size, PAGE);
}

export function listParts(call: Call): void {
  const upload = uploadOf(call);
  const size = pageSize(call, 'max-parts');
  const marker = Number(call.query.get('part-number-marker') ?? 0);
  const rest = [...upload.parts.values()].filter((part) => part.number > marker).sort((a, b) => a.number - b.number);
  const page = rest.slice(0, size);
  sendXml(call, 'ListPartsResult', [
    ['Bucket', call.bucket],
    ['Key', call.key],
    ['UploadId', upload.id],
    ['PartNumberMarker', marker],
    ['NextPartNumberMarker', page.at(-1)?.number],
    ['MaxParts', size],
    ['IsTruncated', rest.length > page.length],
    ...page.map((part): XmlChild => [
      'Part',
      [
        ['PartNumber', part.number],
        ['LastModified', new Date(part.modified).toISOString()],
        ['ETag', `"${part.etag}"`],
        ['Size', part.piece.size],
      ],
    ]),
  ]);
}

const uploadOrder = (a: Upload, b: Upload): number => Buffer.compare(Buffer.from(a.key), Buffer.from(b.key)) || (a.id < b.id ? -1 : 1);

export function listUploads(call: Call): void {
  bucketOf(call);
  if (call.query.has('delimiter')) throw new StoreError(501, 'NotImplemented', 'Uploads cannot be grouped here.');
  const size = pageSize(call, 'max-uploads');
  const [keyMarker, idMarker] = [call.query.get('key-marker') ?? '', call.query.get('upload-id-marker') ?? ''];
  const marker = { key: keyMarker, id: idMarker } as Upload;
  const isAfter = (upload: Upload) => (idMarker ? uploadOrder(marker, upload) < 0 && upload.id !== idMarker : upload.key > keyMarker);
  const rest = [...call.catalogue.uploads.values()]
    .filter((upload) => upload.bucket === call.bucket && upload.key.startsWith(call.query.get('prefix') ?? '') && isAfter(upload))
    .sort(uploadOrder);
  const page = rest.slice(0, size);
  const truncated = rest.length > page.length;
  sendXml(call, 'ListMultipartUploadsResult', [
    ['Bucket', call.bucket],
    ['KeyMarker', keyMarker],
    ['UploadIdMarker', idMarker],
    ['NextKeyMarker', truncated ? page.at(-1)?.key : undefined],
    ['NextUploadIdMarker', truncated ? page.at(-1)?.id : undefined],
    ['MaxUploads', size],
    ['IsTruncated', truncated],
    ...page.map((upload): XmlChild => [
      'Upload',
      [
        ['Key', upload.key],
        ['UploadId', upload.id],
        ['Initiated', new Date(upload.begun).toISOString()],
      ],
    ]),
  ]);
}

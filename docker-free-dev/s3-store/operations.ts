import { bucketLocation, createBucket, deleteBucket, headBucket, listBuckets } from './buckets.ts';
import type { Call } from './call.ts';
import { listObjects } from './listing.ts';
import { abortUpload, completeUpload, createUpload, listParts, listUploads, uploadPart } from './multipart.ts';
import { copyObject, deleteObject, deleteObjects, getObject, putObject } from './objects.ts';
import { StoreError } from './store-error.ts';

type Operation = (call: Call) => void | Promise<void>;

/** Parts of S3 that Oriel has no use for. Asking for one is refused, never answered as if it were something else. */
const NOT_HERE = [
  ...['accelerate', 'acl', 'analytics', 'attributes', 'cors', 'encryption', 'intelligent-tiering', 'inventory', 'legal-hold'],
  ...['lifecycle', 'logging', 'metrics', 'notification', 'object-lock', 'ownershipControls', 'partNumber', 'policy', 'policyStatus'],
  ...['publicAccessBlock', 'replication', 'requestPayment', 'restore', 'retention', 'select', 'tagging', 'torrent', 'versionId'],
  ...['versioning', 'versions', 'website'],
];

function bucketOperation({ method, query }: Call): Operation | undefined {
  switch (method) {
    case 'PUT':
      return createBucket;
    case 'HEAD':
      return headBucket;
    case 'DELETE':
      return deleteBucket;
    case 'POST':
      return query.has('delete') ? deleteObjects : undefined;
    case 'GET':
      if (query.has('location')) return bucketLocation;
      return query.has('uploads') ? listUploads : listObjects;
    default:
      return undefined;
  }
}

function uploadOperation({ method, query }: Call): Operation | undefined {
  if (method === 'PUT' && query.has('partNumber')) return uploadPart;
  if (method === 'POST') return completeUpload;
  if (method === 'GET') return listParts;
  return method === 'DELETE' ? abortUpload : undefined;
}

function objectOperation(call: Call): Operation | undefined {
  if (call.query.has('uploadId')) return uploadOperation(call);
  switch (call.method) {
    case 'PUT':
      return call.req.headers['x-amz-copy-source'] ? copyObject : putObject;
    case 'GET':
    case 'HEAD':
      return getObject;
    case 'DELETE':
      return deleteObject;
    case 'POST':
      return call.query.has('uploads') ? createUpload : undefined;
    default:
      return undefined;
  }
}

/** @throws StoreError where this store does not do what is asked */
export function operationFor(call: Call): Operation {
  const unknown = NOT_HERE.find((name) => call.query.has(name) && !(name === 'partNumber' && call.query.has('uploadId')));
  if (unknown) throw new StoreError(501, 'NotImplemented', `This store does not do "${unknown}".`);
  if (Buffer.byteLength(call.key) > 1024) throw new StoreError(400, 'KeyTooLongError', 'Keys may have at most 1024 bytes.');
  if (!call.bucket) return call.method === 'GET' ? listBuckets : refuse(call);
  return (call.key ? objectOperation(call) : bucketOperation(call)) ?? refuse(call);
}

function refuse(call: Call): never {
  throw new StoreError(405, 'MethodNotAllowed', `${call.method} is not allowed here.`);
}

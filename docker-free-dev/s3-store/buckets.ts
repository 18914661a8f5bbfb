import { bucketOf, type Call, sendEmpty, sendXml } from './call.ts';
import { StoreError } from './store-error.ts';
import type { XmlChild } from './xml.ts';

export function listBuckets(call: Call): void {
  const buckets = [...call.catalogue.buckets].map(([name, { created }]): XmlChild => [
    'Bucket',
    [
      ['Name', name],
      ['CreationDate', new Date(created).toISOString()],
    ],
  ]);
  sendXml(call, 'ListAllMyBucketsResult', [
    ['Owner', [['ID', 'oriel']]],
    ['Buckets', buckets],
  ]);
}

/** AWS S3 user guide, "Bucket naming rules", as far as they matter on loopback. */
export function requireBucketName(name: string): void {
  if (!/^[a-z0-9][a-z0-9.-]{1,61}[a-z0-9]$/.test(name)) throw new StoreError(400, 'InvalidBucketName', 'The bucket name is not valid.');
}

export function createBucket(call: Call): void {
  call.req.resume();
  requireBucketName(call.bucket);
  if (call.catalogue.buckets.has(call.bucket)) throw new StoreError(409, 'BucketAlreadyOwnedByYou', 'The bucket exists already.');
  call.catalogue.record({ does: 'make-bucket', bucket: call.bucket, created: Date.now() });
  sendEmpty(call, 200, { location: `/${call.bucket}` });
}

export function headBucket(call: Call): void {
  bucketOf(call);
  sendEmpty(call, 200, { 'x-amz-bucket-region': call.region });
}

export function deleteBucket(call: Call): void {
  const busy = [...call.catalogue.uploads.values()].some((upload) => upload.bucket === call.bucket);
  if (bucketOf(call).objects.size > 0 || busy) throw new StoreError(409, 'BucketNotEmpty', 'The bucket is not empty.');
  call.catalogue.record({ does: 'remove-bucket', bucket: call.bucket });
  sendEmpty(call, 204);
}

export function bucketLocation(call: Call): void {
  bucketOf(call);
  // us-east-1 is said by an empty element.
  sendXml(call, 'LocationConstraint', call.region === 'us-east-1' ? [] : [['LocationConstraint', call.region]]);
}

import { bucketOf, type Call, sendXml } from './call.ts';
import type { StoredObject } from './entries.ts';
import { uriEncode } from './signature.ts';
import { StoreError } from './store-error.ts';
import type { XmlChild } from './xml.ts';

const PAGE = 1000;

interface Question {
  prefix: string;
  delimiter: string;
  /** Only names after this one. */
  after: string;
  most: number;
}

interface Page {
  keys: string[];
  prefixes: string[];
  /** The last name of the page, where more follow. */
  next: string | null;
}

const isAfter = (a: string, b: string): boolean => Buffer.compare(Buffer.from(a), Buffer.from(b)) > 0;

/** Index of the first key that is not before `name`. */
function firstFrom(keys: string[], name: string): number {
  let [low, high] = [0, keys.length];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (isAfter(name, keys[middle] ?? '')) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** One page of a sorted list of keys: keys themselves, and prefixes up to the delimiter in place of what they hold. */
export function pageOf(keys: string[], { prefix, delimiter, after, most }: Question): Page {
  const page: Page = { keys: [], prefixes: [], next: null };
  let last = after;
  for (let index = firstFrom(keys, isAfter(after, prefix) ? after : prefix); index < keys.length; index += 1) {
    const key = keys[index] ?? '';
    if (!key.startsWith(prefix)) break;
    const end = delimiter ? key.indexOf(delimiter, prefix.length) : -1;
    const name = end < 0 ? key : key.slice(0, end + delimiter.length);
    if (name === last || !isAfter(name, after)) continue;
    if (page.keys.length + page.prefixes.length >= most) {
      page.next = most > 0 ? last : null;
      break;
    }
    (end < 0 ? page.keys : page.prefixes).push(name);
    last = name;
  }
  return page;
}

function readToken(token: string | undefined): string | undefined {
  return token === undefined ? undefined : Buffer.from(token, 'base64url').toString('utf8');
}

function readQuestion(call: Call, version2: boolean): Question {
  const most = Number(call.query.get('max-keys') ?? PAGE);
  if (!(Number.isInteger(most) && most >= 0)) throw new StoreError(400, 'InvalidArgument', 'max-keys must be a number.');
  const start = call.query.get(version2 ? 'start-after' : 'marker');
  const after = (version2 ? readToken(call.query.get('continuation-token')) : undefined) ?? start ?? '';
  const [prefix, delimiter] = [call.query.get('prefix') ?? '', call.query.get('delimiter') ?? ''];
  return { prefix, delimiter, after, most: Math.min(most, PAGE) };
}

function contents(key: string, object: StoredObject | undefined): XmlChild {
  return [
    'Contents',
    [
      ['Key', key],
      ['LastModified', new Date(object?.modified ?? 0).toISOString()],
      ['ETag', `"${object?.etag}"`],
      ['Size', object?.size],
      ['StorageClass', 'STANDARD'],
    ],
  ];
}

/** ListObjectsV2, and ListObjects for clients that still ask that way. */
export function listObjects(call: Call): void {
  const bucket = bucketOf(call);
  const version2 = call.query.get('list-type') === '2';
  const question = readQuestion(call, version2);
  const page = pageOf(call.catalogue.sortedKeys(bucket), question);
  const encoding = call.query.get('encoding-type') === 'url' ? 'url' : undefined;
  const write = (name: string) => (encoding ? uriEncode(name).replaceAll('%2F', '/') : name);
  const paging: XmlChild[] = version2
    ? [
        ['KeyCount', page.keys.length + page.prefixes.length],
        ['ContinuationToken', call.query.get('continuation-token')],
        ['NextContinuationToken', page.next === null ? undefined : Buffer.from(page.next).toString('base64url')],
      ]
    : [
        ['Marker', write(question.after)],
        ['NextMarker', page.next === null ? undefined : write(page.next)],
      ];
  sendXml(call, 'ListBucketResult', [
    ['Name', call.bucket],
    ['Prefix', write(question.prefix)],
    ['Delimiter', question.delimiter ? write(question.delimiter) : undefined],
    ['MaxKeys', question.most],
    ['EncodingType', encoding],
    ['IsTruncated', page.next !== null],
    ...paging,
    ...page.keys.map((key) => contents(write(key), bucket.objects.get(key))),
    ...page.prefixes.map((prefix): XmlChild => ['CommonPrefixes', [['Prefix', write(prefix)]]]),
  ]);
}

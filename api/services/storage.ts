import type { Readable } from 'node:stream';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  DeleteObjectsCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  ListPartsCommand,
  NoSuchKey,
  NotFound,
  PutObjectCommand,
  S3Client,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import type { Config } from '../config.ts';

export interface StoredPart {
  number: number;
  size: number;
  etag: string;
}
export interface ByteSpan {
  start: number;
  /** Inclusive. */
  end: number;
}

/** The file store: originals, pictures and archives in one bucket, spoken to in the S3 protocol. */
export class Store {
  readonly #client: S3Client;
  readonly #bucket: string;

  constructor(settings: Config['store']) {
    this.#bucket = settings.bucket;
    this.#client = new S3Client({
      region: settings.region,
      ...(settings.endpoint ? { endpoint: settings.endpoint } : {}),
      forcePathStyle: settings.pathStyle,
      credentials: { accessKeyId: settings.accessKeyId, secretAccessKey: settings.secretAccessKey },
      // Stores other than the protocol's first do not know the newer checksums.
      requestChecksumCalculation: 'WHEN_REQUIRED',
      responseChecksumValidation: 'WHEN_REQUIRED',
    });
  }

  /** Answers once the bucket can be reached; throws otherwise. */
  async ready(): Promise<void> {
    await this.#client.send(new HeadBucketCommand({ Bucket: this.#bucket }));
  }

  /** Stores a body of known length. */
  async put(key: string, body: Buffer, type: string): Promise<void> {
    await this.#client.send(new PutObjectCommand({ Bucket: this.#bucket, Key: key, Body: body, ContentType: type }));
  }

  /** Stores a stream of unknown length in parts; nothing is kept when the stream or `signal` breaks it off. */
  async putStream(
    key: string,
    body: Readable,
    type: string,
    tools: { signal?: AbortSignal; onBytes?: (sent: number) => void } = {},
  ): Promise<void> {
    const upload = new Upload({
      client: this.#client,
      params: { Bucket: this.#bucket, Key: key, Body: body, ContentType: type },
      partSize: 8 * 1024 * 1024,
      queueSize: 3,
    });
    upload.on('httpUploadProgress', (progress) => tools.onBytes?.(progress.loaded ?? 0));
    const abort = () => void upload.abort();
    tools.signal?.addEventListener('abort', abort, { once: true });
    try {
      await upload.done();
    } finally {
      tools.signal?.removeEventListener('abort', abort);
    }
  }

  /** Opens an object, or a span of it, as a stream. The caller must read or destroy it. */
  async get(key: string, span?: ByteSpan, signal?: AbortSignal): Promise<Readable> {
    const range = span ? { Range: `bytes=${span.start}-${span.end}` } : {};
    const answer = await this.#client.send(
      new GetObjectCommand({ Bucket: this.#bucket, Key: key, ...range }),
      signal ? { abortSignal: signal } : {},
    );
    return answer.Body as Readable;
  }

  async getBuffer(key: string): Promise<Buffer> {
    const chunks: Buffer[] = [];
    for await (const chunk of await this.get(key)) chunks.push(chunk as Buffer);
    return Buffer.concat(chunks);
  }

  /** Size in bytes and time of an object; undefined where there is none. */
  async head(key: string): Promise<{ size: number; modified: Date | undefined } | undefined> {
    try {
      const head = await this.#client.send(new HeadObjectCommand({ Bucket: this.#bucket, Key: key }));
      return { size: head.ContentLength ?? 0, modified: head.LastModified };
    } catch (error) {
      if (error instanceof NotFound || error instanceof NoSuchKey) return undefined;
      throw error;
    }
  }

  /** Removes objects; those that are not there do not matter. */
  async remove(...keys: string[]): Promise<void> {
    for (let from = 0; from < keys.length; from += 1000) {
      const Objects = keys.slice(from, from + 1000).map((Key) => ({ Key }));
      await this.#client.send(new DeleteObjectsCommand({ Bucket: this.#bucket, Delete: { Objects, Quiet: true } }));
    }
  }

  /** Every key below a prefix. */
  async *list(prefix: string): AsyncGenerator<{ key: string; size: number }> {
    let token: string | undefined;
    do {
      const page = await this.#client.send(
        new ListObjectsV2Command({ Bucket: this.#bucket, Prefix: prefix, ...(token ? { ContinuationToken: token } : {}) }),
      );
      for (const found of page.Contents ?? []) yield { key: found.Key ?? '', size: found.Size ?? 0 };
      token = page.NextContinuationToken;
    } while (token);
  }

  async createMultipart(key: string, type: string): Promise<string> {
    const made = await this.#client.send(new CreateMultipartUploadCommand({ Bucket: this.#bucket, Key: key, ContentType: type }));
    if (!made.UploadId) throw new Error('The store gave no id for the upload.');
    return made.UploadId;
  }

  /** Sends one part (1 to 10 000); sending it again replaces it. Returns its ETag. */
  async uploadPart(key: string, multipartId: string, number: number, body: Buffer): Promise<string> {
    const sent = await this.#client.send(
      new UploadPartCommand({
        Bucket: this.#bucket,
        Key: key,
        UploadId: multipartId,
        PartNumber: number,
        Body: body,
        ContentLength: body.length,
      }),
    );
    return sent.ETag ?? '';
  }

  async listParts(key: string, multipartId: string): Promise<StoredPart[]> {
    const parts: StoredPart[] = [];
    let marker: string | undefined;
    do {
      const page = await this.#client.send(
        new ListPartsCommand({ Bucket: this.#bucket, Key: key, UploadId: multipartId, ...(marker ? { PartNumberMarker: marker } : {}) }),
      );
      for (const part of page.Parts ?? []) parts.push({ number: part.PartNumber ?? 0, size: part.Size ?? 0, etag: part.ETag ?? '' });
      marker = page.IsTruncated ? page.NextPartNumberMarker : undefined;
    } while (marker);
    return parts;
  }

  async completeMultipart(key: string, multipartId: string, parts: StoredPart[]): Promise<void> {
    const Parts = parts.map((part) => ({ PartNumber: part.number, ETag: part.etag }));
    await this.#client.send(
      new CompleteMultipartUploadCommand({ Bucket: this.#bucket, Key: key, UploadId: multipartId, MultipartUpload: { Parts } }),
    );
  }

  /** Gives up an unfinished upload; one that is gone already does not matter. */
  async abortMultipart(key: string, multipartId: string): Promise<void> {
    try {
      await this.#client.send(new AbortMultipartUploadCommand({ Bucket: this.#bucket, Key: key, UploadId: multipartId }));
    } catch (error) {
      if ((error as { name?: string }).name !== 'NoSuchUpload') throw error;
    }
  }

  /** A presigned address that a browser may GET until `seconds` after `from`. The same `from` gives the same address. */
  presign(key: string, from: Date, seconds: number): Promise<string> {
    return getSignedUrl(this.#client, new GetObjectCommand({ Bucket: this.#bucket, Key: key }), { expiresIn: seconds, signingDate: from });
  }

  stop(): void {
    this.#client.destroy();
  }
}

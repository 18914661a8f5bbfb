import type { Request } from 'express';
import multer, { type StorageEngine } from 'multer';
import { problem } from '../../middleware/problem.ts';

/** Fills one buffer of exactly the expected length. @throws Problem 422 where fewer bytes come. */
async function readExactly(stream: NodeJS.ReadableStream, expected: number): Promise<Buffer> {
  const buffer = Buffer.allocUnsafe(expected);
  let filled = 0;
  for await (const chunk of stream as AsyncIterable<Buffer>) {
    if (filled + chunk.length > expected) throw wrongLength(expected);
    chunk.copy(buffer, filled);
    filled += chunk.length;
  }
  if (filled !== expected) throw wrongLength(expected);
  return buffer;
}

function wrongLength(expected: number) {
  return problem(422, `The part has another length than the ${expected} bytes it must have.`, { code: 'part-length' });
}

/**
 * Reads the one file of a multipart/form-data request into memory of exactly its length and hands it on; nothing is
 * written to this machine's disk, and nothing beyond the part is kept.
 * @param send Takes the bytes to where they belong.
 */
export async function receivePart(req: Request, expected: number, send: (part: Buffer) => Promise<void>): Promise<void> {
  const engine: StorageEngine = {
    _handleFile: (_req, file, done) => {
      readExactly(file.stream, expected)
        .then((part) => send(part))
        .then(() => done(null, { size: expected }))
        .catch((error: unknown) => {
          // What still comes is read and dropped, so that the answer reaches the browser.
          file.stream.resume();
          done(error);
        });
    },
    _removeFile: (_req, _file, done) => done(null),
  };
  const limits = { files: 1, fields: 4, fileSize: expected + 1, headerPairs: 20 };
  const parse = multer({ storage: engine, limits, defParamCharset: 'utf8' }).single('part');
  await new Promise<void>((resolve, reject) => {
    parse(req, req.res as never, (error: unknown) => (error ? reject(asProblem(error, expected)) : resolve()));
  });
  if (!req.file) throw problem(422, 'The request has no part in its field "part".');
}

function asProblem(error: unknown, expected: number): unknown {
  if (!(error instanceof multer.MulterError)) return error instanceof Error && error.message === 'Request aborted' ? broken() : error;
  return error.code === 'LIMIT_FILE_SIZE' ? wrongLength(expected) : problem(422, `${error.message}.`);
}

/** Nobody reads this answer: the line is gone. It keeps an ordinary event out of the log of errors. */
function broken() {
  return problem(400, 'The line broke while the part was sent.');
}

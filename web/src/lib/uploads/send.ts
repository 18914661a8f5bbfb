import { retryAfterMs } from './back-off.ts';
import { TransportProblem, type ProblemKind } from './transport.ts';

/** A request over which no byte moves for so long is given up: a line that went silent does not end by itself. */
const SILENCE = 60_000;

/** One request of the upload queue. */
export interface Request {
  method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  path: string;
  body?: FormData | string;
  signal: AbortSignal;
  /** Bytes of the body that have left. */
  onProgress?: (loaded: number) => void;
}

/**
 * Sends a request by XMLHttpRequest, which unlike fetch tells how many bytes of the body have left.
 * @returns the parsed JSON of the answer, undefined where it has no content
 * @throws TransportProblem for everything but 2xx; AbortError where the signal ends it
 */
export function send(request: Request): Promise<unknown> {
  const { signal } = request;
  if (signal.aborted) return Promise.reject(stopped());
  const xhr = new XMLHttpRequest();
  return new Promise<unknown>((resolve, reject) => {
    const quiet = watchSilence(xhr, () => reject(lineLost()));
    const end = () => xhr.abort();
    signal.addEventListener('abort', end);
    xhr.upload.onprogress = (event) => {
      quiet.heard();
      request.onProgress?.(event.loaded);
    };
    xhr.onprogress = quiet.heard;
    xhr.onload = () => (xhr.status < 300 ? resolve(json(xhr)) : reject(problemOf(xhr)));
    xhr.onerror = () => reject(lineLost());
    xhr.onabort = () => reject(stopped());
    xhr.onloadend = () => {
      quiet.stop();
      signal.removeEventListener('abort', end);
    };
    xhr.open(request.method, request.path);
    xhr.setRequestHeader('accept', 'application/json');
    if (typeof request.body === 'string') xhr.setRequestHeader('content-type', 'application/json');
    xhr.send(request.body ?? null);
  });
}

function watchSilence(xhr: XMLHttpRequest, tell: () => void): { heard: () => void; stop: () => void } {
  let timer: ReturnType<typeof setTimeout>;
  const stop = () => clearTimeout(timer);
  const heard = () => {
    stop();
    timer = setTimeout(() => {
      tell();
      xhr.abort();
    }, SILENCE);
  };
  heard();
  return { heard, stop };
}

function stopped(): DOMException {
  return new DOMException('Stopped.', 'AbortError');
}

function lineLost(): TransportProblem {
  return new TransportProblem('line', 'The line is lost. Trying again.');
}

function json(xhr: XMLHttpRequest): unknown {
  return xhr.responseText === '' ? undefined : JSON.parse(xhr.responseText);
}

/** Answers for which waiting helps: the server asks for it, or something in front of it has no server to ask. */
const BUSY = [429, 502, 503, 504];

/** The upload has ended or lost its parts on the server: asking anew tells how to go on (codes of the uploads' contract). */
const OVER = /^(upload|parts)-/;

function kindOf(status: number, code: string | undefined): ProblemKind {
  if (BUSY.includes(status)) return 'busy';
  if (status >= 500) return 'server';
  if (status === 401) return 'signed-out';
  if (status === 404 || status === 410) return 'gone';
  return status === 409 && OVER.test(code ?? '') ? 'gone' : 'refused';
}

function problemOf(xhr: XMLHttpRequest): TransportProblem {
  const { code, sentence } = bodyOf(xhr);
  const kind = kindOf(xhr.status, code);
  const own = kind === 'refused' || kind === 'busy' ? sentence : undefined;
  return new TransportProblem(kind, own ?? SENTENCES[kind], retryAfterMs(xhr.getResponseHeader('retry-after'), Date.now()));
}

const SENTENCES: Record<ProblemKind, string> = {
  line: 'The line is lost. Trying again.',
  busy: 'The server asks to wait a moment. Trying again.',
  server: 'The server failed over this file. Trying again.',
  gone: 'The server does not know this upload any more. Starting it again.',
  'signed-out': 'Your session has ended. Sign in again in another tab, then continue.',
  refused: 'The server refused this file.',
};

/** What the answer says (RFC 9457), where it says anything: the code, and the sentence about the first wrong field or the whole. */
function bodyOf(xhr: XMLHttpRequest): { code?: string; sentence?: string } {
  try {
    const { code, detail, errors } = JSON.parse(xhr.responseText) as { code?: string; detail?: string; errors?: { message?: string }[] };
    const sentence = errors?.[0]?.message ?? detail;
    return { ...(code !== undefined && { code }), ...(sentence !== undefined && { sentence }) };
  } catch {
    return {};
  }
}

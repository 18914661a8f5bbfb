/** A wrong field, as the server names it. */
export interface FieldError {
  path: string;
  message: string;
}

interface ProblemBody {
  title?: string;
  detail?: string;
  code?: string;
  errors?: FieldError[];
}

/**
 * A request that was refused or did not arrive. `status` 0 means that no answer came at all.
 * `message` and `detail` are a sentence that may be shown as it is.
 */
export class ApiProblem extends Error {
  readonly status: number;
  readonly detail: string;
  readonly code: string | undefined;
  readonly errors: FieldError[];
  /** Seconds the server asks us to wait before trying again. */
  readonly retryAfter: number | undefined;

  constructor(status: number, detail: string, more: { code?: string; errors?: FieldError[]; retryAfter?: number } = {}) {
    super(detail);
    this.name = 'ApiProblem';
    this.status = status;
    this.detail = detail;
    this.code = more.code;
    this.errors = more.errors ?? [];
    this.retryAfter = more.retryAfter;
  }
}

export interface CallOptions {
  signal?: AbortSignal | undefined;
  /** Sent as If-Match: the version the row had when it was read; the server answers 412 when it has moved on. */
  version?: number | undefined;
  /** Added to the address; undefined and null values are left out. */
  query?: Record<string, string | number | boolean | null | undefined> | undefined;
  headers?: Record<string, string> | undefined;
  /** Lets the browser finish the request although the page is being left. */
  keepalive?: boolean | undefined;
}

const SENTENCES: Record<number, string> = {
  0: 'No answer from the server. Please check your connection and try again.',
  401: 'Your session has ended. Please sign in again.',
  403: 'You are not allowed to do this.',
  404: 'This is not here, or not for you.',
  412: 'Somebody changed this meanwhile. Load it again to see the present state.',
  413: 'This is too large.',
  429: 'Too many tries. Please wait a moment and try again.',
  503: 'The server is not ready. Please try again in a moment.',
};

/** The sentence shown where the server gave none. */
export function sentenceFor(status: number): string {
  return SENTENCES[status] ?? (status >= 500 ? 'The server failed. Please try again.' : 'The request was refused.');
}

function addressOf(path: string, query: CallOptions['query']): string {
  if (!query) return path;
  const wanted = Object.entries(query).flatMap(([name, value]) => (value == null ? [] : [[name, String(value)]]));
  const search = new URLSearchParams(wanted).toString();
  return search ? `${path}${path.includes('?') ? '&' : '?'}${search}` : path;
}

async function problemOf(response: Response): Promise<ApiProblem> {
  const isProblem = response.headers.get('content-type')?.includes('json') ?? false;
  const body = isProblem ? ((await response.json().catch(() => ({}))) as ProblemBody) : {};
  const wait = Number(response.headers.get('retry-after'));
  return new ApiProblem(response.status, body.detail ?? sentenceFor(response.status), {
    ...(body.code ? { code: body.code } : {}),
    ...(body.errors ? { errors: body.errors } : {}),
    ...(wait > 0 ? { retryAfter: wait } : {}),
  });
}

async function call<T>(method: string, path: string, body: unknown, options: CallOptions = {}): Promise<T> {
  const isForm = body instanceof FormData || body instanceof Blob;
  const headers: Record<string, string> = { accept: 'application/json', ...options.headers };
  if (body !== undefined && !isForm) headers['content-type'] = 'application/json';
  if (options.version !== undefined) headers['if-match'] = `"${options.version}"`;
  let response: Response;
  try {
    response = await fetch(addressOf(path, options.query), {
      method,
      headers,
      credentials: 'same-origin',
      ...(body === undefined ? {} : { body: isForm ? body : JSON.stringify(body) }),
      ...(options.signal ? { signal: options.signal } : {}),
      ...(options.keepalive ? { keepalive: true } : {}),
    });
  } catch (error) {
    if (options.signal?.aborted) throw error;
    throw new ApiProblem(0, sentenceFor(0));
  }
  if (!response.ok) throw await problemOf(response);
  if (response.status === 204 || !response.headers.get('content-type')?.includes('json')) return undefined as T;
  return (await response.json()) as T;
}

/**
 * The one way to the server. Paths begin with /api. Every method throws an ApiProblem when it is refused.
 * An answer without content gives undefined.
 */
export const api = {
  get: <T>(path: string, options?: CallOptions) => call<T>('GET', path, undefined, options),
  post: <T>(path: string, body?: unknown, options?: CallOptions) => call<T>('POST', path, body, options),
  put: <T>(path: string, body?: unknown, options?: CallOptions) => call<T>('PUT', path, body, options),
  patch: <T>(path: string, body?: unknown, options?: CallOptions) => call<T>('PATCH', path, body, options),
  delete: <T>(path: string, options?: CallOptions) => call<T>('DELETE', path, undefined, options),
};

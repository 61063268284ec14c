/** The one way from the pages to the API: cookie sign-in, one retry after a refresh, problem documents. */
import type { z } from 'zod';
import { ApiProblem, problemFrom } from './problem.ts';
import { refreshOnce } from './refresh.ts';

export type Query = Readonly<Record<string, string | number | boolean | null | undefined>>;

type Call<Answer> = {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  query?: Query;
  body?: unknown;
  /** A file form; sent as it is. */
  form?: FormData;
  /** Repeating the call with the same key does nothing twice. */
  idempotencyKey?: string;
  signal?: AbortSignal;
  /** The contract the answer has to keep. Without one nothing is read from it. */
  answer?: z.ZodType<Answer>;
};

/** Addresses of the API, with empty query fields left out. */
export function address(path: string, query: Query = {}): string {
  const fields = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value !== null && value !== undefined && value !== '') fields.set(name, String(value));
  }
  const text = fields.toString();
  return text ? `${path}?${text}` : path;
}

const listeners = new Set<() => void>();

/** Told once each time the server says that nobody is signed in. */
export function onSignedOut(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

async function send<Answer>(path: string, call: Call<Answer>): Promise<Response> {
  const headers: Record<string, string> = { accept: 'application/json' };
  if (call.body !== undefined) headers['content-type'] = 'application/json';
  if (call.idempotencyKey) headers['idempotency-key'] = call.idempotencyKey;
  try {
    return await fetch(address(path, call.query), {
      method: call.method ?? 'GET',
      headers,
      credentials: 'same-origin',
      body: call.form ?? (call.body === undefined ? undefined : JSON.stringify(call.body)),
      signal: call.signal,
    });
  } catch (cause) {
    if (call.signal?.aborted) throw cause;
    throw new ApiProblem({ status: 0, code: 'unreachable' }, { cause });
  }
}

/** Sends and refreshes once where the short token has run out. */
async function sendSignedIn<Answer>(path: string, call: Call<Answer>): Promise<Response> {
  const sentAt = Date.now();
  const first = await send(path, call);
  if (first.status !== 401 || path === '/api/sign-in') return first;
  if (await refreshOnce(sentAt)) {
    const second = await send(path, call);
    if (second.status !== 401) return second;
  }
  for (const listener of listeners) listener();
  return first;
}

/**
 * Calls the API and gives back what the contract promises.
 * @throws ApiProblem for every refusal, a lost connection and an answer that breaks its contract.
 */
export async function api<Answer = void>(path: string, call: Call<Answer> = {}): Promise<Answer> {
  const response = await sendSignedIn(path, call);
  if (!response.ok) throw await problemFrom(response);
  if (!call.answer) return undefined as Answer;
  const read = call.answer.safeParse(await response.json());
  if (read.success) return read.data;
  throw new ApiProblem(
    {
      status: response.status,
      code: 'unexpected_answer',
      requestId: response.headers.get('x-request-id'),
    },
    { cause: read.error },
  );
}

/** Fetches a file under the same sign-in. @throws ApiProblem */
export async function apiFile(path: string, query?: Query): Promise<Blob> {
  const response = await sendSignedIn(path, { query });
  if (!response.ok) throw await problemFrom(response);
  return response.blob();
}

/** A fresh key for one intended act; keep it while the act is retried. */
export function newIdempotencyKey(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

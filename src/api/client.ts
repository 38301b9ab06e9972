import type { Problem } from '../../shared/contract/index.ts';
import { ProblemError } from './problem-error.ts';
import { readRates, type RateStanding } from './rate-standing.ts';
import { askToSignIn } from './sign-in-again.ts';

export interface Ask<Data> {
  readonly method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  readonly body?: object;
  /** In place of a body: the bytes of a file. */
  readonly file?: Blob;
  /** Entity tag of the state that the change was made from. */
  readonly ifMatch?: string;
  /** A request repeated with the same key is done once and answered alike. */
  readonly key?: string;
  readonly signal?: AbortSignal;
  /** What the answer must be; left out where it is large, or of no further use. */
  readonly schema?: { safeParse(input: unknown): { success: true; data: Data } | { success: false } };
}

export interface Answer<Data> {
  readonly data: Data;
  /** Names the state that was answered; empty where it has none. */
  readonly etag: string;
  readonly rates: readonly RateStanding[];
}

/** A server that has not answered by then will not, in milliseconds. */
const patienceMs = 30_000;

/**
 * Sends one request to the API. A change that finds the sign-in gone asks the person to sign in again and is then sent
 * once more, so that nothing typed is lost on the way.
 *
 * @param path below `/api/v1`
 * @throws {ProblemError} and nothing else, but for an aborted `signal`
 */
export async function ask<Data = undefined>(path: string, request: Ask<Data> = {}): Promise<Answer<Data>> {
  const { method = 'GET' } = request;
  try {
    return await send(path, method, request);
  } catch (error) {
    const isExpired = error instanceof ProblemError && error.status === 401 && method !== 'GET';
    if (!isExpired || !(await askToSignIn())) throw error;
    return send(path, method, request);
  }
}

async function send<Data>(path: string, method: string, request: Ask<Data>): Promise<Answer<Data>> {
  const { body, file, ifMatch, key, signal, schema } = request;
  const headers = new Headers();
  if (body !== undefined) headers.set('Content-Type', 'application/json');
  if (file !== undefined) headers.set('Content-Type', 'application/octet-stream');
  if (ifMatch !== undefined) headers.set('If-Match', ifMatch);
  if (key !== undefined) headers.set('Idempotency-Key', key);
  const response = await fetchOrSay(`/api/v1${path}`, {
    method,
    headers,
    body: body === undefined ? (file ?? null) : JSON.stringify(body),
    signal: signal ?? null,
  });
  const rates = readRates(response.headers.get('RateLimit'));
  const content = await contentOf(response, signal);
  if (!response.ok) throw refusalOf(response.status, content, rates);
  const parsed = schema?.safeParse(content);
  if (parsed?.success === false) throw unreadable(response.status);
  const data = (parsed?.success ? parsed.data : content) as Data;
  return { data, etag: response.headers.get('ETag') ?? '', rates };
}

/** Fetches, and says in words what kept the answer away. */
export async function fetchOrSay(address: string, init: RequestInit = {}): Promise<Response> {
  const waiting = AbortSignal.timeout(patienceMs);
  const signal = init.signal ? AbortSignal.any([init.signal, waiting]) : waiting;
  try {
    return await fetch(address, { ...init, signal });
  } catch (error) {
    if (init.signal?.aborted) throw error;
    throw unreachable(error);
  }
}

const unreachable = (cause: unknown) =>
  new ProblemError({
    kind: 'unreachable',
    status: 0,
    message: navigator.onLine
      ? 'The server does not answer. It may be starting anew, or the connection may be lost.'
      : 'This device is offline.',
    cause,
  });

const unreadable = (status: number) =>
  new ProblemError({
    kind: 'unreadable',
    status,
    message:
      'The server answers in a form that this page does not know. Load the page again: it may be newer.',
  });

async function contentOf(response: Response, signal: AbortSignal | undefined): Promise<unknown> {
  if (response.status === 204 || response.status === 202) return undefined;
  try {
    return await response.json();
  } catch (error) {
    if (signal?.aborted) throw error;
    if (response.ok) throw error instanceof SyntaxError ? unreadable(response.status) : unreachable(error);
    return undefined;
  }
}

/** The error of a refusal, read with care: what stands between may answer in its own way. */
function refusalOf(status: number, content: unknown, rates: readonly RateStanding[]): ProblemError {
  const { type, title, detail, errors, current } = (
    typeof content === 'object' && content !== null ? content : {}
  ) as Record<string, unknown>;
  const problems = Array.isArray(errors) ? errors.filter(isProblem) : [];
  const kind = typeof type === 'string' ? type.replace(/^.*\//, '') : 'refused';
  const words = [ownWords[kind], detail, title].find((text) => typeof text === 'string' && text !== '');
  return new ProblemError({
    kind,
    status,
    message: typeof words === 'string' ? words : `The server refuses this (status ${status}).`,
    problems,
    current,
    rates,
  });
}

/** Where the server's own words are for who writes programs. */
const ownWords: Readonly<Record<string, string>> = {
  'precondition-failed': 'Somebody else has changed this since you opened it.',
};

const isProblem = (one: unknown): one is Problem =>
  typeof one === 'object' &&
  one !== null &&
  ['path', 'value', 'allowed'].every((name) => typeof (one as Record<string, unknown>)[name] === 'string');

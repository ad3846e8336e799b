import type { z } from 'zod';

import { errorBodySchema, type ErrorBody } from '@/contract/errors';

import { takeEarly } from './early-requests';

/** A refusal by the server, or no answer from it, in words that can be shown. */
export class ApiError extends Error {
  readonly status: number;
  readonly code: ErrorBody['error']['code'] | 'no-connection';
  readonly fields: Readonly<Record<string, string>>;
  readonly head: ErrorBody['error']['head'];

  constructor(
    status: number,
    error: {
      code: ApiError['code'];
      message: string;
      fields?: Record<string, string>;
      head?: ErrorBody['error']['head'];
    },
  ) {
    super(error.message);
    this.name = 'ApiError';
    this.status = status;
    this.code = error.code;
    this.fields = error.fields ?? {};
    this.head = error.head;
  }
}

let csrfToken = '';

/** Called with the token of every session body; sent back with every change. */
export function setCsrfToken(token: string): void {
  csrfToken = token;
}

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

async function refusal(response: Response): Promise<ApiError> {
  const body: unknown = await response.json().catch(() => null);
  const parsed = errorBodySchema.safeParse(body);
  if (parsed.success) return new ApiError(response.status, parsed.data.error);
  return new ApiError(response.status, {
    code: 'internal',
    message: `The server answered with status ${response.status} and no explanation. Try again in a moment.`,
  });
}

async function send(method: Method, path: string, body?: unknown, signal?: AbortSignal): Promise<Response> {
  const headers: Record<string, string> = { accept: 'application/json' };
  if (body !== undefined) headers['content-type'] = 'application/json';
  if (method !== 'GET') headers['x-csrf-token'] = csrfToken;
  let response: Response;
  try {
    response = await ((method === 'GET' && takeEarly(path)) ||
      fetch(`/api${path}`, {
        method,
        headers,
        credentials: 'same-origin',
        ...(body === undefined ? {} : { body: JSON.stringify(body) }),
        ...(signal ? { signal } : {}),
      }));
  } catch (cause) {
    if (cause instanceof DOMException && cause.name === 'AbortError') throw cause;
    throw new ApiError(0, {
      code: 'no-connection',
      message:
        'The server could not be reached. Your work is kept here; try again when the connection is back.',
    });
  }
  if (!response.ok) throw await refusal(response);
  return response;
}

async function sendAndRead<S extends z.ZodType>(
  method: Method,
  path: string,
  schema: S,
  body?: unknown,
  signal?: AbortSignal,
): Promise<z.infer<S>> {
  const response = await send(method, path, body, signal);
  return schema.parse(await response.json());
}

/** Calls to the server. Every answer is checked against its shape in the contract. */
export const api = {
  get: <S extends z.ZodType>(path: string, schema: S, signal?: AbortSignal) =>
    sendAndRead('GET', path, schema, undefined, signal),
  post: <S extends z.ZodType>(path: string, body: unknown, schema: S) =>
    sendAndRead('POST', path, schema, body),
  put: <S extends z.ZodType>(path: string, body: unknown, schema: S) =>
    sendAndRead('PUT', path, schema, body),
  patch: <S extends z.ZodType>(path: string, body: unknown, schema: S) =>
    sendAndRead('PATCH', path, schema, body),
  /** A change without an answer worth reading. */
  postOnly: async (path: string, body: unknown): Promise<void> => void (await send('POST', path, body)),
  delete: async (path: string): Promise<void> => void (await send('DELETE', path)),
};

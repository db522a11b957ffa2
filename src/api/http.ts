import type { z } from 'zod';
import { problem, type Fault } from '../../shared/contracts/api';

/** The server said no, and said why; `message` is a sentence with the next step. */
export class Refusal extends Error {
  constructor(
    readonly status: number,
    message: string,
    readonly faults: Fault[] = [],
  ) {
    super(message);
    this.name = 'Refusal';
  }
}

/** No answer at all: the server is gone or the network is. */
export class Unreachable extends Error {
  constructor() {
    super('Redpoll’s server does not answer. Check that it runs, then try again.');
    this.name = 'Unreachable';
  }
}

interface RequestOptions {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Sent as JSON, or as it is where it is a form. */
  body?: unknown;
  signal?: AbortSignal;
}

async function send(path: string, { method = 'GET', body, signal }: RequestOptions): Promise<Response> {
  const form = body instanceof FormData;
  try {
    return await fetch(path, {
      method,
      signal,
      credentials: 'same-origin',
      headers: { Accept: 'application/json', ...(body === undefined || form ? {} : { 'Content-Type': 'application/json' }) },
      body: body === undefined ? undefined : form ? body : JSON.stringify(body),
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new Unreachable();
  }
}

async function refusalOf(response: Response): Promise<Refusal> {
  const parsed = problem.safeParse(await response.json().catch(() => null));
  return parsed.success
    ? new Refusal(response.status, parsed.data.detail, parsed.data.faults)
    : new Refusal(response.status, `The server answered ${response.status} without saying why. Try again in a moment.`);
}

/**
 * The only place that fetches. Reads the answer by its contract.
 * Throws {@link Refusal} where the server says no, {@link Unreachable} where nobody answers.
 */
export async function request<Schema extends z.ZodType>(
  path: string,
  schema: Schema,
  options: RequestOptions = {},
): Promise<z.output<Schema>> {
  const response = await send(path, options);
  if (!response.ok) throw await refusalOf(response);
  return schema.parse(response.status === 204 ? undefined : await response.json());
}

/** Fetches a document, with the name that the server gives it. Throws like {@link request}. */
export async function requestFile(path: string): Promise<{ name: string; content: Blob }> {
  const response = await send(path, {});
  if (!response.ok) throw await refusalOf(response);
  const name = /filename="([^"]+)"/.exec(response.headers.get('content-disposition') ?? '')?.[1];
  return { name: name ?? 'document', content: await response.blob() };
}

/** The sentence to show for whatever went wrong. */
export function sentenceOf(error: unknown): string {
  if (error instanceof Refusal || error instanceof Unreachable) return error.message;
  return 'Something went wrong on this page. Load it again; what is saved is safe.';
}

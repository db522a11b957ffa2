import type { NextFunction, Request, Response } from 'express';
import multer from 'multer';
import { ConnectionError, DatabaseError, ForeignKeyConstraintError, UniqueConstraintError } from 'sequelize';
import type { Fault, ProblemDetails } from '../../shared/contracts/api';

const TITLES = {
  'malformed-request': [400, 'The request could not be read'],
  'not-signed-in': [401, 'Not signed in'],
  'not-allowed': [403, 'Not allowed'],
  'foreign-page': [403, 'Sent from another page'],
  'not-found': [404, 'Not found'],
  conflict: [409, 'It does not fit what is there'],
  'too-large': [413, 'Too large'],
  misdirected: [421, 'Unknown host'],
  'wrong-fields': [422, 'Something in it is wrong'],
  'too-many': [429, 'Too many attempts'],
  unavailable: [503, 'Not available just now'],
  'cannot-print': [503, 'Nothing can be printed just now'],
  'server-fault': [500, 'A fault of ours'],
} as const satisfies Record<string, [number, string]>;
export type RefusalCode = keyof typeof TITLES;

/** A request that is refused: what happened and what to do next, in a sentence for the page. */
export class Refusal extends Error {
  readonly status: number;
  constructor(
    readonly code: RefusalCode,
    readonly detail: string,
    readonly faults?: Fault[],
  ) {
    super(detail);
    this.name = 'Refusal';
    this.status = TITLES[code][0];
  }
}

/** The answer of RFC 9457 for a refusal. */
export function problemOf(refusal: Refusal): ProblemDetails {
  return {
    type: `urn:redpoll:problem:${refusal.code}`,
    title: TITLES[refusal.code][1],
    status: refusal.status,
    detail: refusal.detail,
    ...(refusal.faults ? { faults: refusal.faults } : {}),
  };
}

export function sendProblem(response: Response, refusal: Refusal): void {
  response
    .status(refusal.status)
    .type('application/problem+json')
    .send(JSON.stringify(problemOf(refusal)));
}

const codeOf = (error: unknown) => (typeof error === 'object' && error !== null && 'type' in error ? error.type : undefined);

/** SQLSTATEs of a statement that gave way to others: cancelled by its time limit, lost a deadlock, or could not be put in a row. */
const GAVE_WAY = new Set(['57014', '40P01', '40001']);
const stateOf = (error: DatabaseError) => ('code' in error.original ? String(error.original.code) : '');

/** What the libraries throw, said in our words; null where the error is not known. */
function knownRefusal(error: unknown): Refusal | null {
  if (error instanceof Refusal) return error;
  if (error instanceof multer.MulterError)
    return error.code === 'LIMIT_FILE_SIZE'
      ? new Refusal(
          'too-large',
          'The file is larger than 5 MB. A production file is text and far smaller: check that it is the right file.',
        )
      : new Refusal('malformed-request', 'Send one file in the field `file`.');
  if (error instanceof URIError) return new Refusal('malformed-request', 'The address cannot be read. Check the link.');
  if (error instanceof UniqueConstraintError)
    return new Refusal('conflict', 'Somebody saved the same thing just now. Load the page again.');
  if (error instanceof ForeignKeyConstraintError)
    return new Refusal('conflict', 'Something it names was removed just now. Load the page again.');
  if (error instanceof ConnectionError)
    return new Refusal('unavailable', 'The database does not answer. Nothing was changed: try again in a moment.');
  if (error instanceof DatabaseError && GAVE_WAY.has(stateOf(error)))
    return new Refusal('unavailable', 'Many people are saving just now. Nothing was changed: try again in a moment.');
  switch (codeOf(error)) {
    case 'entity.parse.failed':
    case 'encoding.unsupported':
    case 'charset.unsupported':
    case 'request.size.invalid':
    case 'request.aborted':
      return new Refusal('malformed-request', 'The request is not readable JSON. Load the page again and repeat the step.');
    case 'entity.too.large':
      return new Refusal('too-large', 'That is too much at once. Send it in smaller steps.');
    default:
      return error instanceof Error && /^(Multipart:|Unexpected end of form|Malformed part header)/.test(error.message)
        ? new Refusal('malformed-request', 'The upload broke off. Choose the file again.')
        : null;
  }
}

/** The one place where errors become answers; what is not known is logged and masked. */
export function answerError(error: unknown, request: Request, response: Response, next: NextFunction): void {
  if (response.headersSent) {
    next(error);
    return;
  }
  const refusal = knownRefusal(error);
  if (!refusal || refusal.status >= 500) request.log.error({ err: error }, 'unexpected error');
  sendProblem(
    response,
    refusal ?? new Refusal('server-fault', 'Something went wrong on our side; it is in the log. Nothing was changed: try again.'),
  );
}

/** Answer for an address of the API that does not exist. */
export function answerUnknown(_request: Request, response: Response): void {
  sendProblem(response, new Refusal('not-found', 'There is nothing at this address. Go back to the start page.'));
}

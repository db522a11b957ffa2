import { z } from 'zod';
import { planCall, planOutcome } from './plan';
import { role } from './roles';
import { row } from './changes';
import { text, title, wallDate } from './values';

/** Requests and responses of the API other than changes. Both sides infer their types from these. */

/** RFC 9457 problem details; `faults` where a file or field is wrong. */
export const fault = z.object({ path: z.string(), line: z.int().optional(), expected: z.string() });
export type Fault = z.infer<typeof fault>;
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  /** What happened and what to do next, in a sentence for the page. */
  detail: z.string(),
  faults: z.array(fault).optional(),
});
export type ProblemDetails = z.infer<typeof problem>;

/** Length in bytes of a text in UTF-8. */
function utf8Length(value: string): number {
  let bytes = 0;
  for (const sign of value) {
    const point = sign.codePointAt(0)!;
    bytes += point < 0x80 ? 1 : point < 0x800 ? 2 : point < 0x10000 ? 3 : 4;
  }
  return bytes;
}

export const email = z.email({ error: 'an e-mail address' }).max(200);
/** bcrypt reads 72 bytes; more would be ignored in silence. */
export const password = z
  .string({ error: 'a password' })
  .min(10, { error: 'a password of at least 10 characters' })
  .refine((value) => utf8Length(value) <= 72, { error: 'a password of at most 72 bytes' });

export const signInRequest = z.object({ email, password: z.string().min(1).max(200) });
export const accountRequest = z.object({ email, password, name: title });
export const passwordRequest = z.object({ current: z.string().min(1).max(200), next: password });

export const sessionResponse = z.object({
  /** Absent where nobody is signed in. A trial user has no e-mail. */
  user: z.object({ id: z.uuid(), name: z.string(), email: z.string().nullable(), trial: z.boolean() }).nullable(),
  /** Whether a trial production may be opened here (server on loopback, nothing forwarded). */
  trialAllowed: z.boolean(),
});
export type SessionResponse = z.infer<typeof sessionResponse>;

export const startingPoint = z.object({
  slug: z.string(),
  title: z.string(),
  summary: z.string(),
  songs: z.int(),
  people: z.int(),
  days: z.int(),
});
export type StartingPoint = z.infer<typeof startingPoint>;

export const productionSummary = z.object({
  id: z.uuid(),
  code: z.string(),
  title: z.string(),
  role,
  songs: z.int(),
  people: z.int(),
  firstDay: z.string().nullable(),
  lastDay: z.string().nullable(),
  version: z.int().nullable(),
  updatedAt: z.string(),
});
export type ProductionSummary = z.infer<typeof productionSummary>;

export const newProductionRequest = z.union([
  z.object({ from: z.string().max(64) }),
  z.object({ code: text(40), title, timezone: text(64) }),
]);
export const importResponse = z.object({ id: z.uuid(), warnings: z.array(fault) });

/** What a member's device holds of a production. With `?since=` only the rows that are newer. */
export const snapshot = z.object({
  id: z.uuid(),
  role,
  /** Which of the production's people the member is, if any. */
  person: z.string().nullable(),
  revision: z.int(),
  version: z.int().nullable(),
  rows: z.array(row),
});
export type Snapshot = z.infer<typeof snapshot>;

export const historyEntry = z.object({
  revision: z.int(),
  at: z.string(),
  by: z.string(),
  resource: z.string(),
  key: z.string(),
  op: z.string(),
  before: z.record(z.string(), z.unknown()).nullable(),
  after: z.record(z.string(), z.unknown()).nullable(),
});
export type HistoryEntry = z.infer<typeof historyEntry>;

/** A plan made on the device, kept on the server as an immutable draft. `inputRevision` is the revision it was made from. */
export const draftRequest = z.object({
  inputRevision: z.int().min(0),
  seed: z.int().min(0),
  iterations: z.int().min(0),
  outcome: planOutcome,
});
export const draft = z.object({
  id: z.uuid(),
  inputRevision: z.int(),
  seed: z.int(),
  iterations: z.int(),
  createdAt: z.string(),
  version: z.int().nullable(),
  outcome: planOutcome,
});
export type Draft = z.infer<typeof draft>;

export const publishRequest = z.object({ plan: z.uuid(), note: text(500).optional() });

/** How one person's call on one date differs from the version before. */
export const callChange = z.object({
  person: z.string(),
  date: wallDate,
  kind: z.enum(['new', 'moved', 'cancelled', 'same']),
  before: planCall.nullable(),
  after: planCall.nullable(),
});
export type CallChange = z.infer<typeof callChange>;

export const version = z.object({
  number: z.int(),
  plan: z.uuid(),
  publishedAt: z.string(),
  by: z.string(),
  note: z.string().nullable(),
  changes: z.array(callChange),
});
export type Version = z.infer<typeof version>;
export const publishedPlan = version.extend({ inputRevision: z.int(), outcome: planOutcome });
export type PublishedPlan = z.infer<typeof publishedPlan>;

/** A calendar feed or a guest's look at the published plan; the address is shown once, only its hash is kept. */
export const linkRequest = z.object({ kind: z.enum(['calendar', 'guest']), person: z.string().optional() });
export const link = z.object({
  id: z.uuid(),
  kind: z.enum(['calendar', 'guest']),
  person: z.string().nullable(),
  createdAt: z.string(),
  revokedAt: z.string().nullable(),
  lastUsedAt: z.string().nullable(),
});
export type Link = z.infer<typeof link>;
export const newLink = link.extend({ address: z.string() });
export type NewLink = z.infer<typeof newLink>;

/** Somebody is added by e-mail: a member at once where they have an account, else invited by an address to hand on. `person`: who of the people they are. */
export const memberRequest = z.object({ email, role, person: z.string().max(64).optional() });
export const memberUpdate = z.object({ role: role.optional(), person: z.string().max(64).nullable().optional() });
export const member = z.object({
  id: z.uuid(),
  /** Null where they have not taken up their invitation. */
  name: z.string().nullable(),
  email: z.string().nullable(),
  role,
  person: z.string().nullable(),
  /** An invitation that waits. */
  invited: z.boolean(),
  /** Whether this is who asks. */
  self: z.boolean(),
});
export type Member = z.infer<typeof member>;
/** `address` is there once, for an invitation: only its hash is kept. */
export const newMember = member.extend({ address: z.string().nullable() });
export type NewMember = z.infer<typeof newMember>;
export const invitationRequest = z.object({ token: z.string().min(20).max(100) });

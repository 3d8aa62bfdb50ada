import * as z from 'zod/mini';

/** Every problem the API answers with: slug -> HTTP status and title. `type` on the wire is `/problems/<slug>`. */
export const PROBLEMS = {
  'invalid-input': { status: 400, title: 'Some of what was sent can’t be used' },
  'not-signed-in': { status: 401, title: 'Sign in first' },
  'wrong-sign-in': { status: 401, title: 'E-mail or password is wrong' },
  'not-allowed': { status: 403, title: 'Your role doesn’t allow this' },
  'bad-csrf-token': { status: 403, title: 'This page is out of date' },
  'not-found': { status: 404, title: 'There is nothing here' },
  'draft-moved-on': { status: 409, title: 'Somebody else changed this draft' },
  'command-refused': { status: 409, title: 'The drawing can’t take this change' },
  'already-exists': { status: 409, title: 'That exists already' },
  'wrong-state': { status: 409, title: 'It’s too late or too early for that' },
  'not-enough-stock': { status: 409, title: 'There are not that many' },
  'offer-changed': { status: 409, title: 'The shop’s prices or stock have changed' },
  'invitation-ended': { status: 410, title: 'This invitation can’t be used any more' },
  'stale-row': { status: 412, title: 'Somebody else changed this' },
  'if-match-missing': { status: 428, title: 'The revision you saw is missing' },
  'idempotency-key-missing': { status: 428, title: 'The key against double orders is missing' },
  'file-too-large': { status: 413, title: 'The file is too large' },
  'file-type-not-taken': { status: 415, title: 'This kind of file can’t be read' },
  'photo-refused': { status: 422, title: 'The photo can’t be measured' },
  'cannot-be-developed': { status: 422, title: 'The part can’t be unfolded' },
  'has-blockers': { status: 422, title: 'The checks found something that can’t be made' },
  'service-refused': { status: 422, title: 'The other side said no' },
  'too-many-requests': { status: 429, title: 'Too many tries' },
  'service-unreachable': { status: 503, title: 'The other side doesn’t answer' },
  'not-ready': { status: 503, title: 'Not ready yet' },
  internal: { status: 500, title: 'Something broke on our side' },
} as const satisfies Record<string, { status: number; title: string }>;

export type ProblemSlug = keyof typeof PROBLEMS;

/** RFC 9457 problem details as this API writes them. `kept` says what was not lost, `next` what to do. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  instance: z.string(),
  kept: z.optional(z.string()),
  next: z.optional(z.string()),
  requestId: z.optional(z.string()),
  errors: z.optional(z.array(z.object({ pointer: z.string(), detail: z.string() }))),
  /** Extra members by slug, for example the current document for `draft-moved-on`. */
  extra: z.optional(z.unknown()),
});
export type ProblemDetails = z.output<typeof problemSchema>;

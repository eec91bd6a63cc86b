import { z } from 'zod';

/** The closed list of codes by which a client can tell problems apart; the sentence for people is in `detail`. */
export const problemCodes = [
  'bad-request',
  'invalid-input',
  'not-signed-in',
  'forbidden',
  'cross-site',
  'not-found',
  'conflict',
  'stale-version',
  'link-expired',
  'too-large',
  'quota-exceeded',
  'too-many-attempts',
  'upload-incomplete',
  'unavailable',
  'internal',
] as const;
export const problemCode = z.enum(problemCodes);
export type ProblemCode = z.infer<typeof problemCode>;

/** A refusal as RFC 9457 problem details. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: problemCode,
  detail: z.string(),
  requestId: z.string(),
  /** What is wrong with which field of the request; empty where the problem is not about fields. */
  fields: z.array(z.object({ path: z.string(), message: z.string() })),
  /** Seconds after which a refused attempt may be made again. */
  retryAfterSeconds: z.number().int().optional(),
});
export type Problem = z.infer<typeof problem>;

import { z } from 'zod';

/** What a job needs to know: ids only. New fields are optional while old jobs drain. */
export const jobPayloads = {
  /** Read an upload's object, hash and measure it, and keep what was found. */
  'measurement.run': z.object({ organisationId: z.uuid(), runId: z.uuid() }),
  /** Send one mail; its link's token is derived, so neither the queue nor the outbox holds it. */
  'mail.send': z.discriminatedUnion('mail', [
    z.object({ mail: z.literal('invitation'), organisationId: z.uuid(), invitationId: z.uuid() }),
    z.object({ mail: z.literal('password-reset'), email: z.string(), passwordResetId: z.uuid() }),
  ]),
  /** Delete an object that nothing refers to any more, or give up an unfinished upload of it. */
  'object.delete': z.object({ objectKey: z.string(), multipartId: z.string().optional() }),
} as const;

export type JobName = keyof typeof jobPayloads;
export type JobPayload<Name extends JobName> = z.infer<(typeof jobPayloads)[Name]>;
export const jobNames = Object.keys(jobPayloads) as JobName[];

/** Queues are apart so that a long measurement never keeps a mail waiting. */
export const queueNames = ['measuring', 'mail', 'housekeeping'] as const;
export type QueueName = (typeof queueNames)[number];
export const queueOfJob: Record<JobName, QueueName> = {
  'measurement.run': 'measuring',
  'mail.send': 'mail',
  'object.delete': 'housekeeping',
};

/** What travels through the queue: the outbox row that asked for the work, and the request that caused it. */
export const queuedJob = z.object({
  outboxId: z.number().int(),
  requestId: z.string(),
  payload: z.unknown(),
  /** How often the row was handed out before; pauses grow with it. */
  handedOut: z.number().int().optional(),
});
export type QueuedJob = z.infer<typeof queuedJob>;

/** Raised for a job whose name or payload is none of ours: a retry can't mend it. */
export class UnknownJobError extends Error {
  override readonly name = 'UnknownJobError';
}

export function isJobName(name: string): name is JobName {
  return Object.hasOwn(jobPayloads, name);
}

/** Reads a job's payload. @throws UnknownJobError when it isn't what the job's name promises */
export function parseJobPayload<Name extends JobName>(name: Name, payload: unknown): JobPayload<Name> {
  const parsed = jobPayloads[name].safeParse(payload);
  if (!parsed.success) throw new UnknownJobError(`The payload of ${name} is not as agreed: ${z.prettifyError(parsed.error)}`);
  return parsed.data as JobPayload<Name>;
}

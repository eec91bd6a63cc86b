import { z } from 'zod';
import { id } from './common';
import { measuringRun } from './part';

/** What the event stream says. Events are hints: what they name is read again through the api, and `resync` means "read everything again". */
export const serverEvent = z.discriminatedUnion('type', [
  z.object({ type: z.literal('hello') }),
  z.object({ type: z.literal('resync') }),
  z.object({ type: z.literal('signed-out') }),
  z.object({ type: z.literal('people') }),
  z.object({ type: z.literal('project'), projectId: id }),
  /** Many parts of a project at once, or where they stand in its list: read the list again. */
  z.object({ type: z.literal('parts'), projectId: id }),
  z.object({ type: z.literal('part'), projectId: id, partId: id }),
  z.object({ type: z.literal('materials') }),
  z.object({
    type: z.literal('run'),
    projectId: id,
    partId: id,
    state: measuringRun.shape.state,
    stage: measuringRun.shape.stage,
    progress: z.number(),
  }),
]);
export type ServerEvent = z.infer<typeof serverEvent>;

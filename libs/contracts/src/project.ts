import { z } from 'zod';
import { id, keptText, timestamp } from './common';

export const projectName = keptText().trim().min(1, 'Give the project a name.').max(120, 'A name has at most 120 characters.');

export const project = z.object({
  id,
  name: z.string(),
  parts: z.number().int().nonnegative(),
  createdAt: timestamp,
  can: z.object({ rename: z.boolean(), addMeshes: z.boolean() }),
});
export type Project = z.infer<typeof project>;

export const createProjectRequest = z.object({ name: projectName });
export type CreateProjectRequest = z.infer<typeof createProjectRequest>;
export const renameProjectRequest = z.object({ name: projectName });
export type RenameProjectRequest = z.infer<typeof renameProjectRequest>;

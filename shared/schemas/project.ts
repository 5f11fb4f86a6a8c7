import { z } from 'zod';
import { projectRoleSchema } from './account.js';
import { idSchema, nameSchema } from './common.js';

export const projectSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  description: z.string(),
  isArchived: z.boolean(),
  createdAt: z.iso.datetime(),
  /** Roles of the asking user here; empty for an admin who is no member. */
  roles: z.array(projectRoleSchema),
  counts: z.strictObject({ batches: z.int(), captures: z.int(), awaitingReview: z.int() }),
});
export type ProjectDto = z.infer<typeof projectSchema>;
export const projectListSchema = z.strictObject({ items: z.array(projectSchema) });

export const createProjectSchema = z.strictObject({
  name: nameSchema,
  description: z.string().trim().max(2000).default(''),
});
export type CreateProject = z.infer<typeof createProjectSchema>;
export const updateProjectSchema = z.strictObject({
  name: nameSchema.optional(),
  description: z.string().trim().max(2000).optional(),
  isArchived: z.boolean().optional(),
});
export type UpdateProject = z.infer<typeof updateProjectSchema>;

export const memberSchema = z.strictObject({
  userId: idSchema,
  name: z.string(),
  email: z.string(),
  isActive: z.boolean(),
  roles: z.array(projectRoleSchema),
});
export type MemberDto = z.infer<typeof memberSchema>;
export const memberListSchema = z.strictObject({ items: z.array(memberSchema) });
/** PUT /projects/:projectId/members/:userId */
export const putMemberSchema = z.strictObject({ roles: z.array(projectRoleSchema).min(1).max(3) });
export type PutMember = z.infer<typeof putMemberSchema>;

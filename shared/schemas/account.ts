import { z } from 'zod';
import { emailSchema, idSchema, nameSchema } from './common.js';

export const projectRoles = ['analyst', 'reviewer', 'qaManager'] as const;
export const projectRoleSchema = z.enum(projectRoles);
export type ProjectRole = z.infer<typeof projectRoleSchema>;

/** Long enough to matter, short enough to hash; no rule on characters. The server also refuses the commonest ones. */
export const passwordSchema = z.string().min(10).max(200);

export const userSchema = z.strictObject({
  id: idSchema,
  email: z.string(),
  name: z.string(),
  isAdmin: z.boolean(),
  isActive: z.boolean(),
  /** False until an invitation has been accepted. */
  hasPassword: z.boolean(),
  createdAt: z.iso.datetime(),
  lastSeenAt: z.iso.datetime().nullable(),
});
export type UserDto = z.infer<typeof userSchema>;

/** The signed-in user with the roles per project that decide what the client shows. */
export const sessionUserSchema = z.strictObject({
  id: idSchema,
  email: z.string(),
  name: z.string(),
  isAdmin: z.boolean(),
  memberships: z.array(
    z.strictObject({ projectId: idSchema, projectName: z.string(), roles: z.array(projectRoleSchema) }),
  ),
});
export type SessionUser = z.infer<typeof sessionUserSchema>;

export const signInSchema = z.strictObject({ email: emailSchema, password: z.string().min(1).max(200) });
export type SignIn = z.infer<typeof signInSchema>;

/** `token` goes into `Authorization: Bearer`; `renewalToken` into POST /session/renewal where cookies are not kept. */
export const sessionResponseSchema = z.strictObject({
  token: z.string(),
  expiresAt: z.iso.datetime(),
  renewalToken: z.string(),
  user: sessionUserSchema,
});
export type SessionResponse = z.infer<typeof sessionResponseSchema>;

/** GET /session: who is signed in. */
export const currentSessionSchema = z.strictObject({ user: sessionUserSchema, expiresAt: z.iso.datetime() });
export type CurrentSession = z.infer<typeof currentSessionSchema>;

export const renewSessionSchema = z.strictObject({ renewalToken: z.string().min(20).max(200).optional() });

export const inviteUserSchema = z.strictObject({
  email: emailSchema,
  name: nameSchema,
  isAdmin: z.boolean().default(false),
});
export type InviteUser = z.infer<typeof inviteUserSchema>;

export const updateUserSchema = z.strictObject({
  name: nameSchema.optional(),
  isAdmin: z.boolean().optional(),
  isActive: z.boolean().optional(),
});
export type UpdateUser = z.infer<typeof updateUserSchema>;

/** Accepting an invitation and completing a reset are the same act: a one-time token buys a password. */
export const setPasswordSchema = z.strictObject({ token: z.string().min(20).max(200), password: passwordSchema });
export type SetPassword = z.infer<typeof setPasswordSchema>;
export const requestPasswordResetSchema = z.strictObject({ email: emailSchema });
export const changePasswordSchema = z.strictObject({
  currentPassword: z.string().min(1).max(200),
  newPassword: passwordSchema,
});
export type ChangePassword = z.infer<typeof changePasswordSchema>;

/** GET /users */
export const userListSchema = z.strictObject({ items: z.array(userSchema) });

/** GET /users/directory: active users, to pick members from. */
export const userDirectoryQuerySchema = z.strictObject({ search: z.string().trim().max(120).optional() });
export const userDirectorySchema = z.strictObject({
  items: z.array(z.strictObject({ id: idSchema, name: z.string(), email: z.string() })),
});
export type UserDirectory = z.infer<typeof userDirectorySchema>;

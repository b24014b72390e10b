import { z } from 'zod';
import { roles } from '../roles.js';

export const roleSchema = z.enum(roles);

export const signInSchema = z.strictObject({
  email: z.string().trim().min(1, 'Enter your e-mail address').max(254).pipe(z.email('This is not an e-mail address')),
  password: z.string().min(1, 'Enter your password').max(1000),
});

export const sessionSchema = z
  .object({
    user: z.object({ id: z.uuid(), name: z.string(), email: z.string() }),
    team: z.object({ id: z.uuid(), name: z.string() }),
    roles: z.array(roleSchema),
    /** Every team of this person, for the team switch. */
    teams: z.array(z.object({ id: z.uuid(), name: z.string() })),
  })
  .meta({ id: 'Session' });
export type Session = z.infer<typeof sessionSchema>;

export const changeTeamSchema = z.strictObject({ teamId: z.uuid('Not a team id') });

export const changePasswordSchema = z.strictObject({
  currentPassword: z.string().min(1, 'Enter your present password').max(1000),
  newPassword: z
    .string()
    .min(12, 'Use at least 12 characters')
    .refine((text) => new TextEncoder().encode(text).length <= 72, { error: 'Use at most 72 bytes' }),
});

export const memberSchema = z
  .object({ id: z.uuid(), name: z.string(), email: z.string(), roles: z.array(roleSchema) })
  .meta({ id: 'Member' });
export type Member = z.infer<typeof memberSchema>;

export const changeRolesSchema = z.strictObject({ roles: z.array(roleSchema).min(1, 'Keep at least one role') });

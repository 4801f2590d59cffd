import * as z from 'zod';
import { idSchema, instantSchema, nameSchema, roleSchema } from './common';

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('Give an e-mail address, like name@lab.example.'))
  .pipe(z.string().max(200));

export const passwordSchema = z
  .string()
  .min(12, 'Use at least 12 characters.')
  .max(72, 'Keep it under 72 characters.');

export const accountSchema = z.object({
  id: idSchema,
  email: z.string(),
  name: z.string(),
  roles: z.array(roleSchema),
  team: z.object({ id: idSchema, name: z.string() }),
});
export type Account = z.infer<typeof accountSchema>;

/** What the client learns on opening the page: signed in, signed out, or no administrator yet. */
export const sessionSchema = z.discriminatedUnion('state', [
  z.object({ state: z.literal('signed in'), account: accountSchema }),
  z.object({
    state: z.literal('signed out'),
    demo: z.array(z.object({ role: roleSchema, email: z.string(), password: z.string() })),
  }),
  z.object({ state: z.literal('first run') }),
]);
export type Session = z.infer<typeof sessionSchema>;

export const signInRequestSchema = z.object({
  email: emailSchema,
  password: z.string().min(1, 'Give your password.').max(200),
});
export type SignInRequest = z.infer<typeof signInRequestSchema>;

export const firstRunRequestSchema = z.object({
  team: nameSchema,
  name: nameSchema,
  email: emailSchema,
  password: passwordSchema,
});
export type FirstRunRequest = z.infer<typeof firstRunRequestSchema>;

export const changePasswordRequestSchema = z.object({
  current: z.string().min(1, 'Give your current password.'),
  next: passwordSchema,
});
export type ChangePasswordRequest = z.infer<typeof changePasswordRequestSchema>;

/** Someone of the team, as the administrator sees them. */
export const personSchema = z.object({
  id: idSchema,
  email: z.string(),
  name: z.string(),
  roles: z.array(roleSchema),
  state: z.enum(['active', 'invited', 'stopped']),
  addedAt: instantSchema,
  lastSignInAt: instantSchema.nullable(),
});
export type Person = z.infer<typeof personSchema>;
export const peopleSchema = z.object({ people: z.array(personSchema) });

export const invitePersonRequestSchema = z.object({
  name: nameSchema,
  email: emailSchema,
  roles: z.array(roleSchema).min(1, 'Choose at least one role.'),
});
export type InvitePersonRequest = z.infer<typeof invitePersonRequestSchema>;

export const changePersonRequestSchema = z.object({
  roles: z.array(roleSchema).min(1, 'Choose at least one role.').optional(),
  stopped: z.boolean().optional(),
});
export type ChangePersonRequest = z.infer<typeof changePersonRequestSchema>;

/** An invited person chooses a password with the token from the message. */
export const acceptInvitationRequestSchema = z.object({
  token: z.string().min(20).max(200),
  password: passwordSchema,
});
export type AcceptInvitationRequest = z.infer<typeof acceptInvitationRequestSchema>;

/** A message the server sent, or, with no mail server set, would have sent. */
export const messageSchema = z.object({
  id: idSchema,
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  at: instantSchema,
  sent: z.boolean(),
});
export const outboxSchema = z.object({ mailServer: z.boolean(), messages: z.array(messageSchema) });
export type Outbox = z.infer<typeof outboxSchema>;

import { z } from 'zod';
import { idSchema, instantSchema, nameSchema } from './common';
import { roleSchema, scopeSchema } from './lab';

/** Who the caller is, in which lab, with which rights. `scopes` is null for a member who signed in. */
export const meSchema = z.strictObject({
  userId: idSchema,
  name: z.string(),
  email: z.string(),
  labId: idSchema,
  labName: z.string(),
  role: roleSchema,
  scopes: z.array(scopeSchema).nullable(),
  actions: z.array(z.string()),
});
export type Me = z.infer<typeof meSchema>;

const emailSchema = z.email().max(254).toLowerCase();
/** Only a size cap here: what makes a password good is told with reasons by the verb. */
const passwordSchema = z.string().min(1).max(1024);

export const changePasswordSchema = z.strictObject({ present: passwordSchema, next: passwordSchema });
export type ChangePassword = z.infer<typeof changePasswordSchema>;

/** A browser session of the member. */
export const signInSchema = z.strictObject({
  id: idSchema,
  agent: z.string(),
  address: z.string(),
  createdAt: instantSchema,
  lastSeenAt: instantSchema,
  /** The session that asks. */
  isThisOne: z.boolean(),
});
export type SignIn = z.infer<typeof signInSchema>;

export const createInvitationSchema = z.strictObject({ email: emailSchema, role: roleSchema });
export type CreateInvitation = z.infer<typeof createInvitationSchema>;
export const invitationSchema = z.strictObject({
  id: idSchema,
  email: z.string(),
  role: roleSchema,
  state: z.enum(['open', 'accepted', 'revoked', 'expired']),
  inviterName: z.string(),
  createdAt: instantSchema,
  expiresAt: instantSchema,
});
export type Invitation = z.infer<typeof invitationSchema>;

const linkTokenSchema = z.string().min(1).max(200);
export const readInvitationSchema = z.strictObject({ token: linkTokenSchema });
/** What the holder of an invitation's link is told. */
export const invitationLookSchema = z.strictObject({
  email: z.string(),
  role: roleSchema,
  labName: z.string(),
  inviterName: z.string(),
  /** Whether the address has an account already: then its own password is asked for, not a new one. */
  hasAccount: z.boolean(),
});
export type InvitationLook = z.infer<typeof invitationLookSchema>;
/** `name` is needed where there is no account yet. */
export const acceptInvitationSchema = z.strictObject({
  token: linkTokenSchema,
  name: nameSchema.optional(),
  password: passwordSchema,
});
export type AcceptInvitation = z.infer<typeof acceptInvitationSchema>;

export const requestPasswordResetSchema = z.strictObject({ email: emailSchema });
export const resetPasswordSchema = z.strictObject({ token: linkTokenSchema, password: passwordSchema });
export type ResetPassword = z.infer<typeof resetPasswordSchema>;

export const memberSchema = z.strictObject({
  userId: idSchema,
  name: z.string(),
  email: z.string(),
  role: roleSchema,
  joinedAt: instantSchema,
});
export type Member = z.infer<typeof memberSchema>;
export const changeMemberSchema = z.strictObject({ role: roleSchema });
export type ChangeMember = z.infer<typeof changeMemberSchema>;

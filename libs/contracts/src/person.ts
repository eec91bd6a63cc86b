import { z } from 'zod';
import { id, keptText, timestamp } from './common';

/** administrator: people and everything else. engineer: projects and parts. reviewer: reads, and signs what is submitted. reader: reads. */
export const role = z.enum(['administrator', 'engineer', 'reviewer', 'reader']);
export type Role = z.infer<typeof role>;

export const emailAddress = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, 'An e-mail address has at most 254 characters.')
  .pipe(z.email('This is not an e-mail address. It should look like name@company.example.'));
export const personName = keptText().trim().min(1, 'Give a name.').max(120, 'A name has at most 120 characters.');
export const organisationName = keptText()
  .trim()
  .min(1, 'Give the organisation a name.')
  .max(120, 'A name has at most 120 characters.');
/** For a password that is being set; one that is only being checked is not held to it. */
export const newPassword = z
  .string()
  .min(12, 'Use at least 12 characters; a few words in a row are good.')
  .max(256, 'A password has at most 256 characters.');
const givenPassword = z.string().min(1, 'Give your password.').max(256, 'A password has at most 256 characters.');
export const linkToken = z.string().regex(/^[A-Za-z0-9_-]{22}$/, 'This link is not complete. Copy the whole of it from the mail.');

export const signUpRequest = z.object({
  organisationName,
  name: personName,
  email: emailAddress,
  password: newPassword,
});
export type SignUpRequest = z.infer<typeof signUpRequest>;

export const signInRequest = z.object({ email: emailAddress, password: givenPassword });
export type SignInRequest = z.infer<typeof signInRequest>;

/** Who is signed in, where, and what they may do there. */
export const session = z.object({
  user: z.object({ id, name: z.string(), email: z.string() }),
  organisation: z.object({ id, name: z.string() }),
  role,
  organisations: z.array(z.object({ id, name: z.string(), role })),
  can: z.object({ managePeople: z.boolean(), createProject: z.boolean() }),
});
export type Session = z.infer<typeof session>;

export const switchOrganisationRequest = z.object({ organisationId: id });
export type SwitchOrganisationRequest = z.infer<typeof switchOrganisationRequest>;

export const passwordResetRequest = z.object({ email: emailAddress });
export type PasswordResetRequest = z.infer<typeof passwordResetRequest>;
export const passwordResetCompletionRequest = z.object({ token: linkToken, password: newPassword });
export type PasswordResetCompletionRequest = z.infer<typeof passwordResetCompletionRequest>;
export const accepted = z.object({ message: z.string() });
export type Accepted = z.infer<typeof accepted>;

export const member = z.object({
  userId: id,
  name: z.string(),
  email: z.string(),
  role,
  since: timestamp,
  can: z.object({ changeRole: z.boolean(), remove: z.boolean() }),
});
export type Member = z.infer<typeof member>;
export const changeRoleRequest = z.object({ role });
export type ChangeRoleRequest = z.infer<typeof changeRoleRequest>;

export const invitation = z.object({
  id,
  email: z.string(),
  role,
  invitedBy: z.string(),
  createdAt: timestamp,
  expiresAt: timestamp,
  /** expired: the link no longer works; invite again. */
  state: z.enum(['open', 'expired']),
});
export type Invitation = z.infer<typeof invitation>;
export const createInvitationRequest = z.object({ email: emailAddress, role });
export type CreateInvitationRequest = z.infer<typeof createInvitationRequest>;

export const invitationLookupRequest = z.object({ token: linkToken });
export type InvitationLookupRequest = z.infer<typeof invitationLookupRequest>;
/** What the holder of an invitation's link is shown before they accept. */
export const openInvitation = z.object({
  organisationName: z.string(),
  email: z.string(),
  role,
  /** The address has an account already: accepting asks for its password instead of a new one. */
  hasAccount: z.boolean(),
});
export type OpenInvitation = z.infer<typeof openInvitation>;
export const acceptInvitationRequest = z.discriminatedUnion('as', [
  z.object({ as: z.literal('new-person'), token: linkToken, name: personName, password: newPassword }),
  z.object({ as: z.literal('known-person'), token: linkToken, password: givenPassword }),
]);
export type AcceptInvitationRequest = z.infer<typeof acceptInvitationRequest>;

import { z } from 'zod';
import { roles } from '../../access/permissions.js';
import { emailAddress, linkToken, newPassword, personName } from '../../access/person-fields.js';

const role = z.enum(roles);

export const memberSchema = z.strictObject({
  userId: z.uuid(),
  name: z.string(),
  email: z.string(),
  role,
  since: z.iso.datetime(),
});
export type Member = z.infer<typeof memberSchema>;
export const memberListSchema = z.strictObject({ items: z.array(memberSchema) });
export type MemberList = z.infer<typeof memberListSchema>;

export const memberEditSchema = z.strictObject({ role });
export type MemberEdit = z.infer<typeof memberEditSchema>;

export const newInvitationSchema = z.strictObject({ email: emailAddress, role });
export type NewInvitation = z.infer<typeof newInvitationSchema>;

/** An invitation that still waits; one whose time has run out can be sent again. */
export const invitationSchema = z.strictObject({
  id: z.uuid(),
  email: z.string(),
  role,
  invitedBy: z.string(),
  createdAt: z.iso.datetime(),
  expiresAt: z.iso.datetime(),
  expired: z.boolean(),
});
export type Invitation = z.infer<typeof invitationSchema>;
export const invitationListSchema = z.strictObject({ items: z.array(invitationSchema) });
export type InvitationList = z.infer<typeof invitationListSchema>;

export const invitationLookSchema = z.strictObject({ token: linkToken });
export type InvitationLook = z.infer<typeof invitationLookSchema>;

/** What an invited person sees before they accept. The link went to their mailbox, so it may say all this. */
export const invitationViewSchema = z.strictObject({
  companyName: z.string(),
  email: z.string(),
  role,
  /** They have an account already, and accept with its password; otherwise they choose name and password. */
  hasAccount: z.boolean(),
});
export type InvitationView = z.infer<typeof invitationViewSchema>;

export const invitationAcceptanceSchema = z.strictObject({
  token: linkToken,
  name: personName.optional(),
  /** Of the account that there is, or of the one being made. */
  password: newPassword.optional(),
});
export type InvitationAcceptance = z.infer<typeof invitationAcceptanceSchema>;

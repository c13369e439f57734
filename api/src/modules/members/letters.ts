import type { Role } from '../../access/permissions.js';
import type { Letter } from '../../ports/mail/letter.js';

const as: Readonly<Record<Role, string>> = {
  owner: 'an owner',
  designer: 'a designer',
  crew: 'a member of the crew',
};

export const invitationLetter = (company: string, inviter: string, role: Role, url: string): Letter => ({
  subject: `${company} invites you`,
  paragraphs: [
    'Hello,',
    `${inviter} invites you to work with ${company} in Lampwright, where landscape lighting is planned, as ${as[role]}.`,
  ],
  action: { label: 'Look at the invitation', url },
  afterwards: ['The link works once, for seven days. If you don’t know the company, there is nothing to do.'],
});

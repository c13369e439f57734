import { z } from 'zod';
import type { Proposal, ProposalLink, Recipient, Revision } from './api';

export const MOST_RECIPIENTS = 5;

export const sendSchema = z.object({
  recipients: z
    .array(
      z.object({
        name: z.string().trim().max(120),
        email: z.email({ error: 'Please enter an e-mail address.' }).max(254),
      }),
    )
    .min(1)
    .max(MOST_RECIPIENTS)
    .superRefine((recipients, ctx) => {
      recipients.forEach(({ email }, i) => {
        const first = recipients.findIndex((other) => other.email.toLowerCase() === email.toLowerCase());
        if (email !== '' && first !== i)
          ctx.addIssue({ code: 'custom', path: [i, 'email'], message: 'This address is named twice.' });
      });
    }),
  message: z.string().trim().max(4000),
});
export type SendValues = z.infer<typeof sendSchema>;

interface Party {
  readonly name: string;
  readonly email: string | null;
}

const holds = ({ revokedAt }: ProposalLink) => revokedAt === null;

/** To whom it goes if nobody is told otherwise: who has a link already, or else the client. */
export function firstRecipients({ links }: Pick<Proposal, 'links'>, client: Party): Recipient[] {
  const known = new Map<string, Recipient>();
  for (const { name, email } of links.filter(holds))
    if (!known.has(email.toLowerCase())) known.set(email.toLowerCase(), { name, email });
  return known.size > 0
    ? [...known.values()].slice(0, MOST_RECIPIENTS)
    : [{ name: client.name, email: client.email ?? '' }];
}

interface About {
  readonly revision: Pick<Revision, 'revision' | 'changeOrder'>;
  readonly property: string;
  readonly clientName: string;
  readonly sender: string;
}

/** The letter to begin with. Total, date, link and the company's name come below it by themselves. */
export function firstMessage({ revision, property, clientName, sender }: About): string {
  const first = clientName.trim().split(/\s+/)[0] ?? '';
  const what = revision.changeOrder
    ? `Here is what changes against the proposal you approved for ${property}, with the difference in price.`
    : revision.revision === 1
      ? `Here is our proposal for the lighting of ${property}: the plan over the picture of your garden, what it costs, and when we can do it.`
      : `Here is our revised proposal for the lighting of ${property}. The page shows what has changed.`;
  return [first === '' ? 'Hello,' : `Hello ${first},`, what, sender].join('\n\n');
}

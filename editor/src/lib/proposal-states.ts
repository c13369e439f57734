import { z } from 'zod';

export const proposalStates = [
  'draft',
  'preparing',
  'ready',
  'sent',
  'opened',
  'commented',
  'approved',
  'declined',
  'expired',
  'withdrawn',
] as const;
export const proposalStateSchema = z.enum(proposalStates);
export type ProposalState = z.infer<typeof proposalStateSchema>;

/** How a proposal stands, in a word or two. */
export function proposalWord(state: ProposalState): string {
  switch (state) {
    case 'draft':
      return 'Not made yet';
    case 'preparing':
      return 'Being made';
    case 'ready':
      return 'Ready to send';
    case 'sent':
      return 'Sent';
    case 'opened':
      return 'Opened';
    case 'commented':
      return 'Question asked';
    case 'approved':
      return 'Approved';
    case 'declined':
      return 'Declined';
    case 'expired':
      return 'Expired';
    case 'withdrawn':
      return 'Withdrawn';
  }
}

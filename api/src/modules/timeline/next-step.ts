import type { ProposalState } from '../proposals/proposals.dto.js';
import type { Board } from './timeline.dto.js';
import type { BoardRow } from './timeline.repository.js';

type Next = Board['columns'][number]['cards'][number]['next'];

const company = (what: string): Next => ({ by: 'company', what });
const homeowner = (what: string): Next => ({ by: 'homeowner', what });
const counted = (n: number, one: string): string => `${n} ${one}${n === 1 ? '' : 's'}`;

/** What is owed next for a job, and by whom: the first thing that keeps it from moving on. */
export function nextStep(row: BoardRow, proposal: ProposalState | null): Next {
  if (row.unanswered > 0) return company(`Answer ${counted(row.unanswered, 'question')}`);
  if (proposal !== null && proposal !== 'draft') return afterProposal(row, proposal);
  if (row.sheets === 0) return company('Add a photo or a plot plan');
  if ((row.fixtures ?? 0) === 0) return company('Draw the plan');
  const faults = row.faults ?? 0;
  if (faults > 0) return company(`Fix or accept ${counted(faults, 'fault')}`);
  return company('Price it and make the proposal');
}

function afterProposal(row: BoardRow, state: Exclude<ProposalState, 'draft'>): Next {
  switch (state) {
    case 'preparing':
      return company('The papers are being made');
    case 'ready':
      return company('Send the proposal');
    case 'sent':
    case 'opened':
    case 'commented':
      return homeowner('Answer the proposal');
    case 'declined':
      return company('Declined: make another offer, or archive the job');
    case 'expired':
      return company('Expired: send it anew');
    case 'withdrawn':
      return company('Withdrawn: make a new revision');
    case 'approved':
      return afterApproval(row);
  }
}

function afterApproval(row: BoardRow): Next {
  if (row.owedName !== null) return homeowner(`Pay: ${row.owedName}`);
  switch (row.stage) {
    case 'enquiry':
    case 'plan':
    case 'prove':
    case 'propose':
    case 'prepare':
      return company(row.released ? 'Order the material and set the day' : 'Release the plan to the crew');
    case 'install':
      return company('Build it');
    case 'commission':
      return company('Measure, aim and hand over');
    case 'aftercare':
      return row.outstandingMinor > 0 ? company('Ask for the balance') : company('Plan the next visit');
  }
}

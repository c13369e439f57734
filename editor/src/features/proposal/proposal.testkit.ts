import type { Proposal, ProposalLink, Revision } from './api';

export const revision = (change: Partial<Revision> = {}): Revision => ({
  id: '7d0c2f5e-0c4b-4a57-9c39-6a5d8d2b0001',
  revision: 1,
  state: 'ready',
  changeOrder: false,
  planVersion: 4,
  hash: 'ab'.repeat(32),
  totalMinor: 341_700,
  progress: 100,
  failure: null,
  pdfUrl: '/api/some.pdf',
  validUntil: '2026-06-30',
  createdAt: '2026-05-01T10:00:00.000Z',
  createdBy: 'Dana Osei',
  sentAt: null,
  releasedAt: null,
  approval: null,
  decline: null,
  ...change,
});

export const link = (change: Partial<ProposalLink> = {}): ProposalLink => ({
  id: '7d0c2f5e-0c4b-4a57-9c39-6a5d8d2b0002',
  name: 'Maren Holloway',
  email: 'maren@example.com',
  createdAt: '2026-05-01T11:00:00.000Z',
  expiresAt: '2026-07-01T11:00:00.000Z',
  revokedAt: null,
  openedAt: null,
  remindersSent: 0,
  ...change,
});

export const proposal = (change: Partial<Proposal> = {}): Proposal => ({
  number: 1042,
  state: change.revisions?.[0]?.state ?? 'draft',
  currency: 'USD',
  locale: 'en-US',
  stale: false,
  words: {
    scope: 'We wire the garden.',
    exclusions: '',
    timeline: 'Two days.\n\nIn June.',
    locate: 'We book it.',
    warranty: 'Five years.',
    terms: 'Pay us.',
    cancellation: 'Three days.',
  },
  own: [],
  revisions: [],
  links: [],
  ...change,
});

export const approval = (change: Partial<NonNullable<Revision['approval']>> = {}) => ({
  typedName: 'Maren Holloway',
  at: '2026-05-03T18:00:00.000Z',
  groups: [],
  totalMinor: 341_700,
  signedPdfUrl: '/api/signed.pdf',
  ...change,
});

import { expect, it } from 'vitest';
import { link, proposal, revision } from './proposal.testkit';
import { reminderDaysTyped } from './reminder-days';
import { firstMessage, firstRecipients, sendSchema } from './send';
import { paragraphsOf, withOwn } from './words';

const { words } = proposal();

it('parts paragraphs at empty lines', () => {
  expect(paragraphsOf('One\nstill one\n\n \nTwo\n\n')).toEqual(['One\nstill one', 'Two']);
  expect(paragraphsOf(' \n\n ')).toEqual([]);
});

it('sends all of the job’s own words, with the one that is set or given back', () => {
  expect(withOwn(words, ['scope'], 'terms', 'Later.')).toEqual({ scope: words.scope, terms: 'Later.' });
  expect(withOwn(words, ['scope', 'terms'], 'scope', null)).toEqual({ terms: words.terms });
  expect(withOwn(words, [], 'exclusions', '')).toEqual({ exclusions: '' });
});

it('reads days of reminders as they are typed', () => {
  expect(reminderDaysTyped.parse(' 14,3; 7 7 ')).toEqual([3, 7, 14]);
  expect(reminderDaysTyped.parse('')).toEqual([]);
  for (const wrong of ['0', '3.5', 'soon', '181', '-2', '1 2 3 4 5 6'])
    expect(reminderDaysTyped.safeParse(wrong).success, wrong).toBe(false);
});

it('sends to whoever has a link already, or else to the client', () => {
  const client = { name: 'Maren Holloway', email: null };
  expect(firstRecipients({ links: [] }, client)).toEqual([{ name: 'Maren Holloway', email: '' }]);
  const links = [
    link(),
    link({ email: 'MAREN@example.com', name: 'Maren' }),
    link({ email: 'ola@example.com', revokedAt: '2026-05-02T00:00:00.000Z' }),
  ];
  expect(firstRecipients({ links }, client)).toEqual([
    { name: 'Maren Holloway', email: 'maren@example.com' },
  ]);
});

it('refuses nobody, six, and the same address twice', () => {
  const to = (...emails: string[]) => ({
    recipients: emails.map((email) => ({ name: '', email })),
    message: '',
  });
  expect(sendSchema.safeParse(to('a@example.com', 'b@example.com')).success).toBe(true);
  expect(sendSchema.safeParse(to()).success).toBe(false);
  expect(sendSchema.safeParse(to('a@example.com', 'A@example.com')).success).toBe(false);
  expect(sendSchema.safeParse(to(...'abcdef'.split('').map((c) => `${c}@example.com`))).success).toBe(false);
});

it('writes a letter that fits: first, revised, change order', () => {
  const letter = (change: Parameters<typeof revision>[0]) =>
    firstMessage({
      revision: revision(change),
      property: '14 Harrow Lane',
      clientName: 'Maren Holloway',
      sender: 'Dana Osei',
    });
  expect(letter({})).toMatch(/^Hello Maren,\n\n.*our proposal.*14 Harrow Lane/);
  expect(letter({ revision: 2 })).toContain('revised proposal');
  expect(letter({ revision: 3, changeOrder: true })).toContain('what changes against');
  expect(letter({})).toMatch(/\n\nDana Osei$/);
});

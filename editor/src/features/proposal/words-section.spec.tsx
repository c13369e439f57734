// @vitest-environment jsdom
import { Theme } from '@radix-ui/themes';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { afterEach, expect, it, vi } from 'vitest';
import { proposal } from './proposal.testkit';
import { WordsSection } from './words-section';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function show(own: string[]) {
  const sent: { method: string; body: unknown }[] = [];
  const answer = proposal({ own });
  vi.stubGlobal('fetch', async (request: Request) => {
    sent.push({ method: request.method, body: await request.json() });
    return Response.json(answer);
  });
  render(
    <QueryClientProvider client={new QueryClient()}>
      <Theme>
        <WordsSection
          jobId="7d0c2f5e-0c4b-4a57-9c39-6a5d8d2b0001"
          proposal={answer}
          editable
          companyWords={null}
        />
      </Theme>
    </QueryClientProvider>,
  );
  return sent;
}
const article = (name: string) => within(screen.getByRole('article', { name }));

it('says which words are the job’s own', () => {
  show(['scope']);
  expect(article('Scope of the work').getByText('This job’s own')).toBeTruthy();
  expect(article('Terms').getByText('The company’s')).toBeTruthy();
  expect(article('Terms').queryByRole('button', { name: /back to the company/ })).toBeNull();
});

it('saves one text in place of the company’s, and keeps the others that are own', async () => {
  const sent = show(['scope']);
  fireEvent.click(article('Terms').getByRole('button', { name: /edit for this job/ }));
  const save = article('Terms').getByRole('button', { name: 'Save for this job' });
  expect(save).toHaveProperty('disabled', true);
  fireEvent.change(article('Terms').getByRole('textbox'), {
    target: { value: 'Pay half.\n\nThen the rest. ' },
  });
  fireEvent.click(save);
  await waitFor(() => expect(article('Terms').queryByRole('textbox')).toBeNull());
  expect(sent).toEqual([
    { method: 'PUT', body: { scope: 'We wire the garden.', terms: 'Pay half.\n\nThen the rest.' } },
  ]);
});

it('gives a text back to the company', async () => {
  const sent = show(['scope', 'terms']);
  fireEvent.click(article('Scope of the work').getByRole('button', { name: /back to the company/ }));
  await waitFor(() => expect(sent).toEqual([{ method: 'PUT', body: { terms: 'Pay us.' } }]));
});

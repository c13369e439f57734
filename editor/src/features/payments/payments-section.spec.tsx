// @vitest-environment jsdom
import { Theme } from '@radix-ui/themes';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, expect, it, vi } from 'vitest';
import { PaymentsSection } from '.';
import type { JobPayments } from './api';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const data: JobPayments = {
  currency: 'USD',
  locale: 'en-US',
  agreedMinor: 100_000,
  paidMinor: 0,
  outstandingMinor: 100_000,
  creditMinor: 0,
  dues: [
    {
      id: '7d0c2f5e-0c4b-4a57-9c39-6a5d8d2b0301',
      name: 'Deposit',
      due: 'approval',
      amountMinor: 100_000,
      reducedMinor: 0,
      paidMinor: 0,
      outstandingMinor: 100_000,
      requestedAt: null,
    },
  ],
  payments: [],
  refunds: [],
  documents: [],
};

/** A server that fails the first so many posts. */
function show(failures: number) {
  const posts: { path: string; key: string | null; body: unknown }[] = [];
  let left = failures;
  vi.stubGlobal('fetch', async (request: Request) => {
    if (request.method === 'GET') return Response.json(data);
    const text = await request.text();
    posts.push({
      path: new URL(request.url).pathname,
      key: request.headers.get('Idempotency-Key'),
      body: text === '' ? null : JSON.parse(text),
    });
    if (left-- > 0) throw new TypeError('Failed to fetch');
    return Response.json(data, { status: 201 });
  });
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <Theme>
        <PaymentsSection jobId="job" editable mayRefund={false} />
      </Theme>
    </QueryClientProvider>,
  );
  return posts;
}

it('records a payment once, with the same key when it is tried again', async () => {
  const posts = show(1);
  fireEvent.click(await screen.findByRole('button', { name: 'Record a payment for: Deposit' }));
  fireEvent.change(screen.getByRole('textbox', { name: /^Amount/ }), { target: { value: '250.50' } });
  const submit = screen.getByRole('button', { name: 'Record the payment' });
  fireEvent.click(submit);
  expect(await screen.findByText(/cannot be reached/)).toBeTruthy();
  fireEvent.click(submit);
  await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
  expect(posts).toHaveLength(2);
  expect(posts[0]?.body).toMatchObject({ method: 'cheque', amountMinor: 25_050 });
  expect(posts[0]?.key).toBeTruthy();
  expect(posts[1]?.key).toBe(posts[0]?.key);
});

it('refuses more than is owed before anything is sent', async () => {
  const posts = show(0);
  fireEvent.click(await screen.findByRole('button', { name: 'Record a payment for: Deposit' }));
  fireEvent.change(screen.getByRole('textbox', { name: /^Amount/ }), { target: { value: '1,000.01' } });
  fireEvent.click(screen.getByRole('button', { name: 'Record the payment' }));
  expect(await screen.findByText(/more than the \$1,000.00 there is/)).toBeTruthy();
  expect(posts).toEqual([]);
});

it('asks for two things with two keys', async () => {
  const posts = show(0);
  const ask = await screen.findByRole('button', { name: 'Ask for it: Deposit' });
  fireEvent.click(ask);
  await waitFor(() => expect(ask.getAttribute('aria-busy')).toBeNull());
  await waitFor(() => expect(posts).toHaveLength(1));
  fireEvent.click(ask);
  await waitFor(() => expect(posts).toHaveLength(2));
  expect(posts[0]?.key).not.toBe(posts[1]?.key);
});

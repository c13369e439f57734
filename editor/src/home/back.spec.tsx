// @vitest-environment jsdom
import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, expect, it, vi } from 'vitest';
import { Home } from './home';
import { approvedPage, sampleDue, sampleLinkId } from './home.testkit';
import { linkOf } from './link';
import { fakeServer } from './server.testkit';

afterEach(() => {
  cleanup();
  document.head.innerHTML = '';
  window.history.replaceState(null, '', '/');
  vi.unstubAllGlobals();
});

/** Opens the page that the card service leads back to. */
function comeBack() {
  document.head.innerHTML = `<meta name="lampwright-link" content="${sampleLinkId}"><meta name="lampwright-state" content="back">`;
  window.history.replaceState(null, '', `/p/back/${sampleLinkId}?paid=${sampleDue().id}`);
  const server = fakeServer(approvedPage());
  return { server, open: () => render(<Home link={linkOf(document)} />) };
}

it('shows the proposal to the browser that went to pay', async () => {
  const { open } = comeBack();
  open();
  expect(await screen.findByText(/did not go through, and nothing was charged/)).toBeTruthy();
});

it('asks for the link of the mail where the browser does not know the proposal', async () => {
  const { server, open } = comeBack();
  server.pageAnswers.push({
    status: 404,
    body: { code: 'not-found', detail: 'This proposal is not there.' },
  });
  open();
  expect(await screen.findByRole('heading', { name: 'Please open the proposal from its mail' })).toBeTruthy();
});

it('says that a link is over, also to whoever comes back', async () => {
  const { server, open } = comeBack();
  server.pageAnswers.push({ status: 410, body: { code: 'link-gone', detail: 'No longer valid.' } });
  open();
  expect(await screen.findByRole('heading', { name: 'This link is no longer valid' })).toBeTruthy();
});

it('says how to pay where cards are not offered', async () => {
  const { server, open } = comeBack();
  server.page = approvedPage({ dues: [sampleDue({ payable: false })] });
  open();
  expect(await screen.findByText(/^Please pay by transfer or cheque, as the invoice says\./)).toBeTruthy();
  expect(screen.queryByRole('button', { name: /by card/ })).toBeNull();
});

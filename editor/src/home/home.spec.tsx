// @vitest-environment jsdom
import { act, cleanup, fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { StrictMode } from 'react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Home } from './home';
import {
  approvedPage,
  changedPage,
  sampleDue,
  sampleLinkId,
  samplePage,
  sampleQuestion,
} from './home.testkit';
import type { Link } from './link';
import { linkOf } from './link';
import { fakeServer } from './server.testkit';
import type { SharedPage } from './share';

beforeEach(() => {
  sessionStorage.clear();
  window.history.replaceState(null, '', '/p/token');
  vi.stubGlobal('scrollTo', vi.fn());
  vi.stubGlobal('CSS', { escape: (text: string) => text });
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

const live: Link = { kind: 'live', id: sampleLinkId, back: false };

async function show(page: SharedPage) {
  const server = fakeServer(page);
  render(
    <StrictMode>
      <Home link={live} />
    </StrictMode>,
  );
  await screen.findByRole('heading', { level: 1 });
  return server;
}
const button = (name: string | RegExp) => screen.getByRole<HTMLButtonElement>('button', { name });
const box = (name: string | RegExp) => screen.getByRole<HTMLInputElement>('checkbox', { name });
const press = (element: Element) => act(async () => fireEvent.click(element));
/** What a row of the sums says, by the name in front of it. */
const sum = (name: string | RegExp) => screen.getByText(name, { selector: 'dt' }).nextSibling?.textContent;

describe('what is included', () => {
  it('adds up as the combinations of the document say, at once', async () => {
    await show(samplePage());
    expect(sum('Subtotal')).toBe('$3,330.00');
    expect(sum(/^Sales tax 6.% on \$1,450\.00$/)).toBe('$87.00');
    expect(sum('Total')).toBe('$3,417.00');
    expect(sum(/^Deposit, 30.%, now$/)).toBe('$1,025.10');
    expect(sum('Balance, when the work is done')).toBe('$2,391.90');

    await press(box(/^Wall and tree/));
    expect(sum('Subtotal')).toBe('$4,620.00');
    expect(sum('Total')).toBe('$4,740.00');
    expect(screen.getByText('Total $4,740.00. Deposit $1,422.00.')).toBeTruthy();
  });

  it('keeps the base in', async () => {
    await show(samplePage());
    const base = box(/^Transformer, timer, wiring base.*always part of the work/);
    expect(base.checked).toBe(true);
    expect(base.disabled).toBe(true);
  });

  it('names what can be added with a plus, and how many lights of what kind', async () => {
    await show(samplePage());
    expect(screen.getByText('+ $1,290.00')).toBeTruthy();
    expect(box(/5 path lights/)).toBeTruthy();
    expect(box(/4 lights, can be added/)).toBeTruthy();
  });

  it('does not take a combination with a fault: says why, and offers what can be had', async () => {
    await show(samplePage());
    await press(box(/^Wall and tree/));
    await press(box(/^Shrub bed/));
    expect(box(/^Shrub bed/).checked).toBe(true);
    expect(screen.getByText(/Without the shrub bed/).closest('[role=status]')).toBeTruthy();
    expect(sum('Total')).toBe('$4,740.00');
    await press(button('Take Path to the patio instead'));
    expect(box(/^Shrub bed/).checked).toBe(false);
    expect(box(/^Wall and tree/).checked).toBe(false);
    expect(screen.queryByText(/Without the shrub bed/)).toBeNull();
  });

  it('names a discount, and what the tax is taken of after it', async () => {
    const page = samplePage();
    const [first, ...rest] = page.document.price.combinations;
    page.document.price.discountName = 'Neighbours';
    page.document.price.combinations = [{ ...first!, discountMinor: 33_300, taxableMinor: 130_500 }, ...rest];
    await show(page);
    expect(sum('Neighbours')).toBe('−$333.00');
    expect(sum(/^Sales tax 6.% on \$1,305\.00$/)).toBe('$87.00');
  });

  it('unfolds into lines that say what makes up the sum', async () => {
    await show(samplePage());
    const base = screen.getByText(/^What makes up \$980\.00/).closest('details')!;
    const rows = within(base).getAllByRole('row', { hidden: true });
    expect(rows.map((row) => row.textContent)).toContain('Cable, 12 gauge210 ft$330.00');
  });

  it('remembers the choice through a reload, and not for another version', async () => {
    await show(samplePage());
    await press(box(/^Wall and tree/));
    cleanup();
    await show(samplePage());
    expect(sum('Total')).toBe('$4,740.00');
    cleanup();
    await show(samplePage({ revisionId: '5f0d6f4c-7c5e-4a8e-9a1e-1c2f3d4e5f61' }));
    expect(sum('Total')).toBe('$3,417.00');
  });
});

describe('the picture', () => {
  it('says what a light is, what it lights, and its figures only under technical details', async () => {
    await show(samplePage());
    await press(button('P3, Brass path light, 3 W'));
    const card = screen.getByRole('region', { name: /^Path light P3\s*Brass path light/ });
    expect(card.textContent).toContain('Lights the stepping stones to the patio.');
    expect(card.textContent).toContain('Part of “Path to the patio”.');
    const volts = within(card).getByText('11.6 V');
    expect(volts.closest('details')?.querySelector('summary')?.textContent).toBe('Technical details');
  });

  it('is the light one at first where the screen is narrow, and the whole one after a closer look', async () => {
    const asked: { src: string; onload: (() => void) | null }[] = [];
    vi.stubGlobal(
      'Image',
      class {
        src = '';
        onload: (() => void) | null = null;
        constructor() {
          asked.push(this);
        }
      },
    );
    await show(samplePage());
    const { url, light } = samplePage().pictures[0]!;
    const picture = document.querySelector('picture')!;
    const source = () => picture.querySelector('source');
    const [media, address] = [source()?.getAttribute('media'), source()?.getAttribute('srcset')];
    expect({ url: address, media }).toEqual(light);
    expect(picture.querySelector('img')?.getAttribute('src')).toBe(url);
    expect(asked).toEqual([]);
    await press(button('Zoom in'));
    await press(button('Zoom out'));
    await press(button('Zoom in'));
    expect(asked.at(-1)?.src).toBe(url);
    // The light one stays until the other can take its place.
    expect(source()).not.toBeNull();
    await act(async () => asked.at(-1)?.onload?.());
    expect(source()).toBeNull();
    await press(button('Show the whole picture'));
    expect(source()).toBeNull();
    expect(picture.querySelector('img')?.getAttribute('src')).toBe(url);
  });

  it('begins with the one that the server puts first, in the order of the sheets', async () => {
    const page = samplePage();
    const [photo] = page.document.sheets;
    const [picture] = page.pictures;
    const plan = { ...photo!, id: 'plan', name: 'Plot plan', view: 'plan' as const };
    await show({
      ...page,
      document: { ...page.document, sheets: [plan, photo!] },
      pictures: [picture!, { ...picture!, sheetId: 'plan' }],
    });
    const tabs = screen.getAllByRole('tab');
    expect(tabs.map((tab) => tab.getAttribute('aria-selected'))).toEqual(['false', 'true']);
  });

  it('tells a light that is not chosen', async () => {
    await show(samplePage());
    expect(button('F1, Wall wash, 6 W, not chosen')).toBeTruthy();
    await press(box(/^Wall and tree/));
    expect(button('F1, Wall wash, 6 W')).toBeTruthy();
  });

  it('takes a place by keyboard alone, and asks about it', async () => {
    const server = await show(samplePage());
    await press(button('Ask about a place'));
    const cross = button(/^Cross at 50 percent/);
    expect(document.activeElement).toBe(cross);
    await act(async () => fireEvent.keyDown(cross, { key: 'ArrowRight', shiftKey: true }));
    await act(async () => fireEvent.keyDown(cross, { key: 'ArrowUp' }));
    await press(button(/^Cross at 60 percent from the left, 48 percent from the top/));
    const text = screen.getByLabelText('Ask Fernhollow Outdoor Lighting');
    expect(document.activeElement).toBe(text);
    fireEvent.change(text, { target: { value: 'A light here too?' } });
    server.willAnswer('questions', { status: 201, body: { ...sampleQuestion, recordId: null } });
    await press(button('Send question'));
    expect(server.posts[0]).toMatchObject({
      path: 'questions',
      body: { text: 'A light here too?', recordId: null, point: { sheetId: 'photo', x: 1440, y: 768 } },
    });
  });
});

describe('questions', () => {
  it('keeps what was written through a reload, and empties when it is sent', async () => {
    await show(samplePage());
    await press(button('P3, Brass path light, 3 W'));
    await press(button('Ask about this light'));
    fireEvent.change(screen.getByLabelText(/^Ask Fernhollow/), { target: { value: 'How bright?' } });
    cleanup();
    const server = await show(samplePage());
    const again = screen.getByLabelText<HTMLTextAreaElement>(/^Ask Fernhollow/);
    expect(again.value).toBe('How bright?');
    expect(screen.getByText('About path light P3')).toBeTruthy();
    server.willAnswer('questions', { status: 201, body: sampleQuestion });
    await press(button('Send question'));
    expect(server.posts[0]?.body).toEqual({ text: 'How bright?', recordId: 'p3', point: null });
    expect(again.value).toBe('');
    expect(screen.getByText('Sent. The answer comes here and by mail.')).toBeTruthy();
    expect(screen.getByText(/The mower comes close/)).toBeTruthy();
  });

  it('tries again with the same key, so that it is asked once', async () => {
    const server = await show(samplePage());
    fireEvent.change(screen.getByLabelText(/^Ask Fernhollow/), { target: { value: 'When?' } });
    server.willAnswer('questions', 'no-network', { status: 201, body: sampleQuestion });
    await press(button('Send question'));
    expect(screen.getByRole('alert').textContent).toContain('No answer came');
    await press(button('Send question'));
    expect(server.posts).toHaveLength(2);
    expect(server.posts[0]?.key).toBeTruthy();
    expect(server.posts[1]?.key).toBe(server.posts[0]?.key);
    // The same words later are another question.
    fireEvent.change(screen.getByLabelText(/^Ask Fernhollow/), { target: { value: 'When?' } });
    server.willAnswer('questions', { status: 201, body: sampleQuestion });
    await press(button('Send question'));
    expect(server.posts[2]?.key).not.toBe(server.posts[0]?.key);
  });

  it('replies in a thread', async () => {
    const server = await show(samplePage({ questions: [sampleQuestion] }));
    const reply = screen.getByLabelText('Reply: About path light P3');
    fireEvent.change(reply, { target: { value: 'Thank you.' } });
    server.willAnswer('messages', { status: 201, body: sampleQuestion });
    await press(button('Send reply'));
    expect(server.posts[0]).toMatchObject({
      path: `questions/${sampleQuestion.id}/messages`,
      body: { text: 'Thank you.' },
    });
  });
});

describe('review and approval', () => {
  it('asks for both confirmations and a name before anything is sent', async () => {
    const server = await show(samplePage());
    await press(button('Review and approve'));
    expect(screen.getByText(/^I approve proposal 1042/)).toBeTruthy();
    await press(button('Approve for $3,417.00'));
    expect(screen.getByText('Please confirm that you approve.')).toBeTruthy();
    expect(screen.getByText('Please confirm that electronic records are fine with you.')).toBeTruthy();
    expect(screen.getByText('Please type your full name.')).toBeTruthy();
    expect(document.activeElement).toBe(box(/^I approve proposal/));
    await press(box(/^I approve proposal/));
    await press(box(/^I agree to sign/));
    fireEvent.change(screen.getByLabelText(/^Your full name/), { target: { value: ' D ' } });
    await press(button('Approve for $3,417.00'));
    expect(document.activeElement).toBe(screen.getByLabelText(/^Your full name/));
    expect(server.posts).toHaveLength(0);
  });

  const sign = async () => {
    await press(button('Review and approve'));
    await press(box(/^I approve proposal/));
    await press(box(/^I agree to sign/));
    fireEvent.change(screen.getByLabelText(/^Your full name/), { target: { value: ' Dana Whitlock ' } });
    await press(button(/^Approve for/));
  };

  it('sends what was on the screen, and then says thanks and what to pay', async () => {
    const server = await show(samplePage());
    await press(box(/^Shrub bed/));
    server.willAnswer('approve', { body: approvedPage() });
    await sign();
    expect(server.posts[0]?.body).toEqual({
      revisionId: samplePage().revisionId,
      hash: samplePage().hash,
      groups: ['path'],
      totalMinor: 228_000,
      typedName: 'Dana Whitlock',
      agreed: true,
      consented: true,
    });
    expect(screen.getByRole('heading', { name: 'Thank you, Dana Whitlock' })).toBeTruthy();
    expect(button('Pay $1,025.10 by card')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Review and approve' })).toBeNull();
    expect(box(/^Shrub bed/).disabled).toBe(true);
    expect(window.location.hash).toBe('');
  });

  it('shows the newer version when the proposal changed meanwhile', async () => {
    const server = await show(samplePage());
    server.willAnswer('approve', {
      status: 409,
      body: { code: 'not-newest', detail: 'There is a newer one.' },
    });
    server.page = samplePage({ revisionId: '5f0d6f4c-7c5e-4a8e-9a1e-1c2f3d4e5f61' });
    await sign();
    expect(screen.getByRole('heading', { name: 'The proposal has changed' })).toBeTruthy();
    expect(screen.queryByRole('heading', { name: 'Review and approve' })).toBeNull();
  });

  it('leaves the review by the browser’s back button', async () => {
    await show(samplePage());
    await press(button('Review and approve'));
    expect(window.location.hash).toBe('#review');
    await act(async () => {
      window.history.back();
      await new Promise((resolve) => window.addEventListener('popstate', resolve, { once: true }));
    });
    expect(screen.queryByRole('heading', { name: 'Review and approve' })).toBeNull();
    expect(button('Review and approve')).toBeTruthy();
  });

  it('offers no approval where no combination can be had', async () => {
    const page = samplePage();
    for (const sums of page.document.price.combinations) sums.offerable = false;
    await show(page);
    expect(screen.queryByRole('button', { name: 'Review and approve' })).toBeNull();
    expect(screen.getByText(/This can’t be approved as it is/)).toBeTruthy();
  });

  it('declines with a reason', async () => {
    const server = await show(samplePage());
    await press(button('Decline this proposal'));
    fireEvent.change(screen.getByLabelText(/^Why\?/), { target: { value: 'Not this year.' } });
    const decline = { reason: 'Not this year.', at: '2027-01-07T10:00:00.000Z' };
    server.willAnswer('decline', { body: samplePage({ state: 'declined', decline }) });
    await press(button('Decline the proposal'));
    expect(server.posts[0]?.body).toEqual({ revisionId: samplePage().revisionId, reason: 'Not this year.' });
    expect(screen.getByText(/“Not this year\.”/)).toBeTruthy();
    // Wherever the page was left before, it is led to what became of it.
    expect(document.activeElement?.textContent).toBe('You declined this proposal');
  });
});

describe('payment', () => {
  it('goes to the card service’s page', async () => {
    const server = await show(approvedPage());
    const assign = vi.fn();
    vi.stubGlobal('location', { ...window.location, assign });
    server.willAnswer('checkout', { body: { url: 'http://cards.example/pay/1' } });
    await press(button('Pay $1,025.10 by card'));
    expect(server.posts[0]?.path).toBe(`dues/${sampleDue().id}/checkout`);
    expect(server.posts[0]?.key).toBeTruthy();
    expect(assign).toHaveBeenCalledWith('http://cards.example/pay/1');
  });

  it('believes the server alone that a card was charged', async () => {
    vi.useFakeTimers({ shouldAdvanceTime: true });
    window.history.replaceState(null, '', `/p/token?paid=${sampleDue().id}`);
    const server = await show(approvedPage({ dues: [sampleDue({ pending: true })] }));
    expect(screen.getByText(/waiting for the card service’s word/)).toBeTruthy();
    await act(() => vi.advanceTimersByTimeAsync(4500));
    expect(screen.getByText(/waiting for the card service’s word/)).toBeTruthy();
    server.page = approvedPage({
      dues: [sampleDue({ outstandingMinor: 0, paidMinor: 102_510, payable: false })],
    });
    await act(() => vi.advanceTimersByTimeAsync(2500));
    expect(screen.getByText('Paid, thank you. The receipt comes by mail.')).toBeTruthy();
  });

  it('offers another try after a card that was declined', async () => {
    window.history.replaceState(null, '', `/p/token?paid=${sampleDue().id}`);
    await show(approvedPage({ dues: [sampleDue()] }));
    expect(screen.getByText(/did not go through, and nothing was charged/)).toBeTruthy();
    expect(button('Try again: pay $1,025.10 by card')).toBeTruthy();
  });

  it('says nothing of a payment to somebody who did not come back from one', async () => {
    await show(approvedPage({ dues: [sampleDue({ pending: true })] }));
    expect(screen.getByText('A card payment was begun and is not finished.')).toBeTruthy();
    expect(button('Go on with the payment')).toBeTruthy();
  });
});

describe('what changed', () => {
  it('is told plainly and marked in the picture', async () => {
    await show(changedPage());
    const changes = screen.getByRole('region', { name: 'What changed since you approved' });
    expect(changes.textContent).toContain('U4, Brass up-light, 5 W');
    expect(changes.textContent).toContain('B1, Bollard, 7 W');
    expect(changes.textContent).toContain('P3, Brass path light, 3 W, by 1 ft');
    expect(changes.textContent).toContain('U1: Brass up-light, 3 W → Brass up-light, 5 W');
    expect(changes.textContent).toContain('Cable, 12 gauge, 190 → 210 ft, +$20.00');
    expect(changes.textContent).toContain('from $3,200.00 to $3,417.00: $217.00 more');
    expect(button('P3, Brass path light, 3 W, moved')).toBeTruthy();
    expect(button('U4, Brass up-light, 5 W, new')).toBeTruthy();
  });
});

describe('states', () => {
  it.each([
    ['<meta name="lampwright-state" content="unknown">', /no proposal at this address/],
    ['<meta name="lampwright-state" content="gone">', /no longer valid/],
    ['', /no proposal at this address/],
  ])('of an address that stands for nothing: %s', async (head, heading) => {
    const server = fakeServer(samplePage());
    document.head.innerHTML = head;
    render(<Home link={linkOf(document)} />);
    expect(screen.getByRole('heading', { name: heading })).toBeTruthy();
    expect(fetch).not.toHaveBeenCalled();
    expect(server.posts).toHaveLength(0);
  });

  it('finds the link in the page', () => {
    document.head.innerHTML = `<meta name="lampwright-link" content="${sampleLinkId}">`;
    expect(linkOf(document)).toEqual(live);
  });

  it.each([
    [404, /no proposal at this address/],
    [410, /no longer valid/],
  ])('of an answer %i', async (status, heading) => {
    const server = fakeServer(samplePage());
    server.pageAnswers.push({ status, body: { code: 'x', detail: 'x' } });
    render(<Home link={live} />);
    expect(await screen.findByRole('heading', { name: heading })).toBeTruthy();
    expect(screen.queryByRole('button')).toBeNull();
  });

  it.each([
    ['no-network' as const, 'No connection'],
    [{ status: 500, body: { code: 'x', detail: 'Something broke.' } }, 'The proposal could not be loaded'],
  ])('can be tried again: %s', async (answer, heading) => {
    const server = fakeServer(samplePage());
    server.pageAnswers.push(answer);
    render(<Home link={live} />);
    expect(screen.getByText('Loading the proposal …')).toBeTruthy();
    expect(await screen.findByRole('heading', { name: heading })).toBeTruthy();
    await press(button('Try again'));
    await waitFor(() => expect(sum('Total')).toBe('$3,417.00'));
  });

  it.each([
    ['expired' as const, /These prices were valid to Jan 31, 2027/],
    ['withdrawn' as const, /This proposal was withdrawn/],
    ['declined' as const, /You declined this proposal/],
  ])('%s: can’t be approved, and says whom to call', async (state, heading) => {
    await show(samplePage({ state }));
    const notice = screen.getByRole('heading', { name: heading }).parentElement!;
    expect(within(notice).getByRole('link', { name: '(555) 010-0142' }).getAttribute('href')).toBe(
      'tel:5550100142',
    );
    expect(screen.queryByRole('button', { name: 'Review and approve' })).toBeNull();
    expect(screen.queryByRole('button', { name: 'Decline this proposal' })).toBeNull();
    expect(box(/^Shrub bed/).disabled).toBe(true);
  });

  it('does not take a script’s event for a person', async () => {
    const server = await show(samplePage());
    fireEvent.pointerDown(document.body);
    fireEvent.keyDown(document.body, { key: 'a' });
    expect(server.posts).toHaveLength(0);
  });
});

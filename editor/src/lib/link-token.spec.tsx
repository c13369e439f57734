// @vitest-environment jsdom
import { act, cleanup, render, screen } from '@testing-library/react';
import { StrictMode, Suspense, use } from 'react';
import { afterEach, expect, it } from 'vitest';
import { tokenOf, useLinkToken } from './link-token';

afterEach(cleanup);

it('finds the token of a mail link', () => {
  expect(tokenOf('#token=a-b_C1')).toBe('a-b_C1');
  expect(tokenOf('#other=1&token=x')).toBe('x');
});

it('gives the empty text where there is none', () => {
  expect(tokenOf('')).toBe('');
  expect(tokenOf('#')).toBe('');
  expect(tokenOf('#top')).toBe('');
});

/** What waits on its first rendering loses its state: the token has to be found again. */
function Page({ later }: { later: Promise<string> }) {
  const token = useLinkToken();
  return <p>{`${use(later)} ${token}`}</p>;
}

it('keeps the token through a rendering that is thrown away, and clears the address', async () => {
  window.history.replaceState(null, '', '/reset-password#token=abc');
  let release = (_value: string) => {};
  const later = new Promise<string>((resolve) => {
    release = resolve;
  });
  await act(async () => {
    render(
      <StrictMode>
        <Suspense fallback="waiting">
          <Page later={later} />
        </Suspense>
      </StrictMode>,
    );
  });
  await act(async () => release('token'));
  expect(screen.getByText('token abc')).toBeTruthy();
  expect(window.location.href).toMatch(/\/reset-password$/);
});

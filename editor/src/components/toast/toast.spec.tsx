// @vitest-environment jsdom
import { act, cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { ApiProblem } from '../../lib/api/client';
import { closeToast, showToast, ToastRegion } from '.';
import { currentToasts } from './toasts';

beforeEach(() => {
  vi.useFakeTimers();
  render(<ToastRegion />);
});
afterEach(() => {
  act(() => {
    for (const { id } of currentToasts()) closeToast(id);
  });
  cleanup();
  vi.useRealTimers();
});

const show = (...args: Parameters<typeof showToast>) => act(() => void showToast(...args));
const wait = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

it('speaks to a screen reader and goes by itself', async () => {
  show({ message: 'Saved.' });
  expect(screen.getByRole('region', { name: 'Messages' }).getAttribute('aria-live')).toBe('polite');
  expect(screen.getByText('Saved.')).toBeTruthy();
  await wait(6_100);
  expect(screen.queryByText('Saved.')).toBeNull();
});

it('stays while somebody points at it or has the focus in it', async () => {
  show({ message: 'Archived.', undo: () => {} });
  fireEvent.focus(screen.getByRole('button', { name: 'Undo' }));
  await wait(60_000);
  expect(screen.getByText('Archived.')).toBeTruthy();
  fireEvent.blur(screen.getByRole('button', { name: 'Undo' }));
  await wait(12_100);
  expect(screen.queryByText('Archived.')).toBeNull();
});

it('undoes once and closes', async () => {
  const undo = vi.fn(async () => {});
  show({ message: 'Archived.', undo });
  fireEvent.click(screen.getByRole('button', { name: 'Undo' }));
  await wait(0);
  expect(undo).toHaveBeenCalledTimes(1);
  expect(screen.queryByText('Archived.')).toBeNull();
});

it('says when undoing failed, and leaves that until it is closed', async () => {
  show({
    message: 'Archived.',
    undo: async () => {
      throw new ApiProblem(0, 'unreachable', 'The server cannot be reached.');
    },
  });
  fireEvent.click(screen.getByRole('button', { name: 'Undo' }));
  await wait(600_000);
  expect(screen.getByText('The server cannot be reached.')).toBeTruthy();
  fireEvent.click(screen.getByRole('button', { name: 'Close this message' }));
  expect(screen.queryByText('The server cannot be reached.')).toBeNull();
});

it('never piles up more than three', () => {
  for (const message of ['one', 'two', 'three', 'four']) show({ message });
  expect(screen.queryByText('one')).toBeNull();
  expect(currentToasts().map(({ message }) => message)).toEqual(['two', 'three', 'four']);
});

// @vitest-environment jsdom
import { act, cleanup, renderHook, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { MOST_BYTES, nameOfFile, useUploads } from './uploads';

/** A server's side of XMLHttpRequest, driven by the test. */
class FakeRequest {
  static sent: FakeRequest[] = [];
  readonly upload: { onprogress: ((event: ProgressEventInit) => void) | null } = { onprogress: null };
  onload: (() => void) | null = null;
  onerror: (() => void) | null = null;
  onabort: (() => void) | null = null;
  onloadend: (() => void) | null = null;
  status = 0;
  responseText = '';
  form = new FormData();
  address = '';
  aborted = false;
  open(_method: string, address: string) {
    this.address = address;
  }
  setRequestHeader() {}
  send(form: FormData) {
    this.form = form;
    FakeRequest.sent.push(this);
  }
  abort() {
    this.aborted = true;
    this.onabort?.();
    this.onloadend?.();
  }
  answer(status: number, body: unknown) {
    this.status = status;
    this.responseText = JSON.stringify(body);
    this.onload?.();
    this.onloadend?.();
  }
}

beforeEach(() => {
  FakeRequest.sent = [];
  vi.stubGlobal('XMLHttpRequest', FakeRequest);
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const photo = (name = 'Patio.jpg') => new File(['photo'], name, { type: 'image/jpeg' });

async function begin(files: readonly File[] = [photo()]) {
  const received = vi.fn();
  const { result } = renderHook(() => useUploads('job 1', received));
  await act(async () => result.current.add(files, 'photo'));
  return { result, received };
}
const nth = async (n: number) => {
  await waitFor(() => expect(FakeRequest.sent.length).toBeGreaterThan(n));
  return FakeRequest.sent[n]!;
};

it('sends the file under a name, tells its progress, and is gone once the server has it', async () => {
  const { result, received } = await begin();
  const request = await nth(0);
  expect(request.address).toBe('/api/jobs/job%201/sheets');
  expect([request.form.get('view'), request.form.get('name')]).toEqual(['photo', 'Patio']);
  act(() => request.upload.onprogress?.({ lengthComputable: true, loaded: 1, total: 4 }));
  expect(result.current.uploads[0]?.step).toEqual({ kind: 'sending', share: 0.25 });
  await act(async () => request.answer(202, { id: 's' }));
  await waitFor(() => expect(result.current.uploads).toEqual([]));
  expect(received).toHaveBeenCalledTimes(1);
});

it('can be cancelled, and then nothing is received', async () => {
  const { result, received } = await begin();
  const request = await nth(0);
  const [upload] = result.current.uploads;
  await act(async () => result.current.cancel(upload!.id));
  expect(request.aborted).toBe(true);
  expect(result.current.uploads).toEqual([]);
  expect(received).not.toHaveBeenCalled();
});

it('keeps a failed upload with its reason, and sends it again when asked', async () => {
  const { result, received } = await begin();
  const request = await nth(0);
  act(() => request.onerror?.());
  await waitFor(() => expect(result.current.uploads[0]?.step.kind).toBe('failed'));
  expect(result.current.uploads[0]?.step).toMatchObject({ canRetry: true });
  act(() => void result.current.retry(result.current.uploads[0]!));
  const again = await nth(1);
  await act(async () => again.answer(202, { id: 's' }));
  await waitFor(() => expect(result.current.uploads).toEqual([]));
  expect(received).toHaveBeenCalledTimes(1);
});

it('offers no second try for a file that was refused', async () => {
  const { result } = await begin();
  const request = await nth(0);
  await act(async () =>
    request.answer(415, { code: 'unknown-kind', detail: 'This file could not be recognised.' }),
  );
  await waitFor(() =>
    expect(result.current.uploads[0]?.step).toEqual({
      kind: 'failed',
      sentence: 'This file could not be recognised.',
      canRetry: false,
    }),
  );
});

it('refuses a file above the limit before sending it', async () => {
  const large = photo('Large.jpg');
  Object.defineProperty(large, 'size', { value: MOST_BYTES + 1 });
  const { result } = await begin([large]);
  await waitFor(() => expect(result.current.uploads[0]?.step.kind).toBe('failed'));
  expect(result.current.uploads[0]?.step).toMatchObject({ canRetry: false });
  expect(FakeRequest.sent).toEqual([]);
});

it('one that fails leaves the others alone', async () => {
  const { result, received } = await begin([photo('One.jpg'), photo('Two.jpg')]);
  const [first, second] = [await nth(0), await nth(1)];
  await act(async () => {
    first.onerror?.();
    second.answer(202, { id: 's' });
  });
  await waitFor(() => expect(received).toHaveBeenCalledTimes(1));
  expect(result.current.uploads.map(({ file }) => file.name)).toEqual(['One.jpg']);
});

it('names a sheet after its file, or after what it is', () => {
  expect(nameOfFile('Patio from the north.jpeg', 'photo')).toBe('Patio from the north');
  expect(nameOfFile('.pdf', 'plan')).toBe('Plot plan');
  expect(nameOfFile(`${'x'.repeat(300)}.png`, 'photo')).toHaveLength(120);
});

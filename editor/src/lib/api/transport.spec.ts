import { afterEach, expect, it, vi } from 'vitest';
import { ApiProblem, isAbort, sentenceOf } from './problem';
import { fetchOrProblem, onSignedOut } from './transport';

afterEach(() => vi.unstubAllGlobals());

const answering = (status: number, body: unknown) =>
  vi.stubGlobal(
    'fetch',
    async () => new Response(typeof body === 'string' ? body : JSON.stringify(body), { status }),
  );
const ask = () => fetchOrProblem(new Request('http://lampwright.example/api/jobs'));
const problem = () =>
  ask().then(
    () => expect.fail('It was answered.'),
    (error: unknown) => {
      if (error instanceof ApiProblem) return error;
      throw error;
    },
  );

it('gives an answer as it is', async () => {
  answering(200, { items: [] });
  expect(await (await ask()).json()).toEqual({ items: [] });
});

it('reads problem details with their faults', async () => {
  answering(400, {
    type: 'urn:lampwright:problem:bad-input',
    status: 400,
    code: 'bad-input',
    detail: 'Some values need attention.',
    errors: [{ pointer: '/name', detail: 'Please enter a name.' }],
  });
  const { status, code, detail, errors } = await problem();
  expect({ status, code, detail }).toEqual({
    status: 400,
    code: 'bad-input',
    detail: 'Some values need attention.',
  });
  expect(errors).toEqual([{ pointer: '/name', detail: 'Please enter a name.' }]);
});

it('has a sentence for an answer that is no problem document', async () => {
  answering(502, '<html>Bad gateway</html>');
  expect((await problem()).detail).toMatch(/starting or cannot be reached/);
  answering(418, '');
  expect((await problem()).detail).toMatch(/try again/i);
});

it('says that the server cannot be reached', async () => {
  vi.stubGlobal('fetch', async () => {
    throw new TypeError('Failed to fetch');
  });
  const { status, code } = await problem();
  expect([status, code]).toEqual([0, 'unreachable']);
});

it('lets an abort through', async () => {
  vi.stubGlobal('fetch', async () => {
    throw new DOMException('Aborted', 'AbortError');
  });
  await expect(ask()).rejects.toSatisfy(isAbort);
});

it('tells of a missing session, and not of a wrong password', async () => {
  let told = 0;
  const stop = onSignedOut(() => {
    told += 1;
  });
  answering(401, { code: 'wrong-password', detail: 'The address and the password don’t belong together.' });
  await problem();
  expect(told).toBe(0);
  answering(401, { code: 'not-signed-in', detail: 'Please sign in.' });
  await problem();
  expect(told).toBe(1);
  stop();
  await problem();
  expect(told).toBe(1);
});

it('never shows the words of a fault in the program', () => {
  expect(sentenceOf(new TypeError('x is undefined'))).not.toContain('undefined');
});

import { randomUUID } from 'node:crypto';
import { type APIRequestContext, expect } from '@playwright/test';
import { linkMailedTo } from './mail.js';

interface Faults {
  readonly faults: readonly { key: string; message: string; acceptance: object | null }[];
}
interface Revision {
  readonly id: string;
  readonly state: string;
}

/** Sends the proposal of a job without the screens, for tests of what comes after. Gives the link. */
export async function sendProposal(request: APIRequestContext, jobId: string): Promise<string> {
  const post = async (path: string, data?: object): Promise<unknown> => {
    const answer = await request.post(`/api/jobs/${jobId}/${path}`, {
      headers: { 'Idempotency-Key': randomUUID() },
      ...(data === undefined ? {} : { data }),
    });
    expect(answer.ok(), `${path}: ${await answer.text()}`).toBe(true);
    return answer.json();
  };
  const { faults } = (await (await request.get(`/api/jobs/${jobId}/quote`)).json()) as Faults;
  for (const { key, message, acceptance } of faults)
    if (acceptance === null)
      await post('fault-acceptances', { faultKey: key, message, reason: 'Within what the lamps stand' });
  const { id } = (await post('proposal/revisions')) as Revision;
  await expect
    .poll(
      async () => {
        const answer = await request.get(`/api/jobs/${jobId}/proposal`);
        const { revisions } = (await answer.json()) as { revisions: Revision[] };
        return revisions.find((revision) => revision.id === id)?.state;
      },
      { message: 'the PDF to be made', timeout: 60_000 },
    )
    .toBe('ready');
  const email = `client.${randomUUID().slice(0, 8)}@example.com`;
  await post(`proposal/revisions/${id}/send`, {
    recipients: [{ name: 'Ines Calder', email }],
    message: 'Here is our proposal.',
  });
  return linkMailedTo(request, email, /^Your proposal/);
}

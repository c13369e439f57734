import type { EveningPlace, NightScene } from '@lampwright/geometry/light';
import type { paths } from '../lib/api/generated/schema';
import { problemFrom, problemOf, unreachable } from './trouble';

type Json<Responses, Status extends keyof Responses> = Responses[Status] extends {
  content: { 'application/json': infer Body };
}
  ? Body
  : never;
type Body<Operation> = Operation extends {
  requestBody?: { content: { 'application/json': infer Content } };
}
  ? Content
  : never;

type Share<Rest extends string> = paths[`/api/share/{linkId}${Rest}` & keyof paths];

/** All that the page shows, as the server's OpenAPI document says. */
export type SharedPage = Json<paths['/api/share/{linkId}']['get']['responses'], 200>;
export type ShareDocument = SharedPage['document'];
export type Light = ShareDocument['lights'][number];
export type Sheet = ShareDocument['sheets'][number];
export type Picture = SharedPage['pictures'][number];
export type Group = ShareDocument['price']['groups'][number];
export type Line = ShareDocument['price']['lines'][number];
export type Combination = ShareDocument['price']['combinations'][number];
export type Stage = Combination['stages'][number];
export type Differences = NonNullable<SharedPage['differences']>;
export type Question = SharedPage['questions'][number];
export type Due = SharedPage['dues'][number];
export type Paper = SharedPage['papers'][number];

/** What the evening is drawn from, sheet by sheet. */
export interface SharedNight {
  readonly evening: EveningPlace;
  readonly scenes: readonly NightScene[];
}

export type NewQuestion = Body<Share<'/questions'>['post']>;
export type Approval = Body<Share<'/approve'>['post']>;
export type Refusal = Body<Share<'/decline'>['post']>;

/** Longer than a slow phone takes, shorter than anybody waits. */
const PATIENCE_MS = 30_000;

async function call<Answer>(linkId: string, rest: string, init: RequestInit = {}): Promise<Answer> {
  const address = `/api/share/${encodeURIComponent(linkId)}${rest}`;
  let response: Response;
  let text: string;
  try {
    response = await fetch(address, {
      credentials: 'same-origin',
      signal: AbortSignal.timeout(PATIENCE_MS),
      ...init,
      headers: { Accept: 'application/json', ...init.headers },
    });
    text = await response.text();
  } catch {
    throw unreachable();
  }
  const body = parsed(text);
  if (!response.ok) throw problemFrom(response.status, body);
  return body as Answer;
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

/** Keys of actions that nobody knows the outcome of: trying again must not do them twice. */
const unsettled = new Map<string, string>();

/** Does something once, however often it is tried: the server knows a repetition by its key. */
async function once<Answer>(linkId: string, rest: string, input: unknown): Promise<Answer> {
  const body = input === undefined ? undefined : JSON.stringify(input);
  const action = `${linkId} ${rest} ${body ?? ''}`;
  const key = unsettled.get(action) ?? crypto.randomUUID();
  unsettled.set(action, key);
  try {
    const answer = await call<Answer>(linkId, rest, {
      method: 'POST',
      headers: {
        'Idempotency-Key': key,
        ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
      },
      body,
    });
    unsettled.delete(action);
    return answer;
  } catch (error) {
    if (isRefusal(error)) unsettled.delete(action);
    throw error;
  }
}

const isRefusal = (error: unknown): boolean => {
  const { status, code } = problemOf(error);
  return status >= 400 && status < 500 && status !== 408 && status !== 429 && code !== 'in-flight';
};

export const getPage = (linkId: string): Promise<SharedPage> => call(linkId, '');

export const getNight = (linkId: string): Promise<SharedNight> => call(linkId, '/night');

/** Somebody is looking at it. Only after a person’s own gesture: mail scanners run scripts too. */
export const tellOpened = (linkId: string): Promise<void> => call(linkId, '/opened', { method: 'POST' });

export const ask = (linkId: string, question: NewQuestion): Promise<Question> =>
  once(linkId, '/questions', question);

export const reply = (linkId: string, questionId: string, text: string): Promise<Question> =>
  once(linkId, `/questions/${questionId}/messages`, { text });

export const approve = (linkId: string, approval: Approval): Promise<SharedPage> =>
  once(linkId, '/approve', approval);

export const decline = (linkId: string, refusal: Refusal): Promise<SharedPage> =>
  once(linkId, '/decline', refusal);

/** Where to pay by card. */
export const checkout = (linkId: string, dueId: string): Promise<{ url: string }> =>
  once(linkId, `/dues/${dueId}/checkout`, undefined);

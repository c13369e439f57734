import type { Question } from '../../lib/affairs';

/** Names of what a question can be pinned to: a light's tag, a sheet's name. */
export interface Names {
  readonly light: (recordId: string) => string | null;
  readonly sheet: (sheetId: string) => string | null;
}

/** What a question is about, in a few words. */
export function aboutOf(question: Pick<Question, 'recordId' | 'sheetId'>, names: Names): string {
  if (question.recordId !== null) return names.light(question.recordId) ?? 'A light that is gone by now';
  if (question.sheetId !== null) {
    const sheet = names.sheet(question.sheetId);
    return sheet === null ? 'A place on a sheet that is gone by now' : `A place on ${sheet}`;
  }
  return 'The whole proposal';
}

/** Open ones first, each group with the newest word on top. */
export function inOrder(questions: readonly Question[]): Question[] {
  const last = (question: Question) => question.messages.at(-1)?.at ?? '';
  const rank = (question: Question) => (question.resolvedAt === null ? 0 : 1);
  return [...questions].sort(
    (a, b) => rank(a) - rank(b) || last(b).localeCompare(last(a)) || a.id.localeCompare(b.id),
  );
}

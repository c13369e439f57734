import type { Place } from './picture/stage';
import type { Light, Question, ShareDocument } from './share';
import { kindInWords } from './words';

/** What a question is about. */
export type About =
  | { readonly kind: 'whole' }
  | { readonly kind: 'light'; readonly recordId: string }
  | ({ readonly kind: 'place'; readonly sheetId: string } & Place);

export const aboutOf = ({ recordId, sheetId, x, y }: Question): About => {
  if (recordId !== null) return { kind: 'light', recordId };
  if (sheetId !== null && x !== null && y !== null) return { kind: 'place', sheetId, x, y };
  return { kind: 'whole' };
};

type Shown = Pick<ShareDocument, 'lights' | 'sheets'>;

export const lightOf = ({ lights }: Pick<Shown, 'lights'>, recordId: string): Light | undefined =>
  lights.find((light) => light.recordId === recordId);

/** "About path light P3". */
export function aboutInWords(document: Shown, about: About): string {
  switch (about.kind) {
    case 'whole':
      return 'About the whole proposal';
    case 'light': {
      const light = lightOf(document, about.recordId);
      return light ? `About ${kindInWords(light)} ${light.tag}` : 'About a light that is no longer planned';
    }
    case 'place': {
      const several = document.sheets.length > 1;
      const sheet = several && document.sheets.find(({ id }) => id === about.sheetId);
      return sheet ? `About a place in “${sheet.name}”` : 'About a place in the picture';
    }
  }
}

/** Nobody has answered it yet: the last word is the homeowner’s. */
export const isWaiting = ({ resolvedAt, messages }: Question): boolean =>
  resolvedAt === null && messages[messages.length - 1]?.side === 'homeowner';

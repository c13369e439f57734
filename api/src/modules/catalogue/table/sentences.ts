import type { z } from 'zod';

/**
 * What a schema refuses in a cell, as a sentence for whoever made the table. Messages that the schema gives
 * itself are sentences already, and win over these.
 */
export function cellSentence(issue: z.core.$ZodRawIssue): string {
  switch (issue.code) {
    case 'too_big':
      return issue.origin === 'string'
        ? `At most ${issue.maximum} characters, please.`
        : `${issue.inclusive === false ? 'Must be less than' : 'Must be at most'} ${issue.maximum}.`;
    case 'too_small':
      return issue.origin === 'string'
        ? 'Something has to stand here.'
        : `${issue.inclusive === false ? 'Must be more than' : 'Must be at least'} ${issue.minimum}.`;
    case 'invalid_type':
      return issue.expected === 'int' ? 'Must be a whole number.' : 'This can’t be read.';
    default:
      return 'This can’t be taken as it is.';
  }
}

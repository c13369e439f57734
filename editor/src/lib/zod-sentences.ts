import type { z } from 'zod';

/**
 * What zod found, as a sentence for the person who filled in the form. Messages that a schema gives itself
 * (the catalogue's, say) are already sentences and win over these.
 */
export function sentenceFor(issue: z.core.$ZodRawIssue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      if (issue.expected === 'number' || issue.expected === 'int')
        return Number.isNaN(issue.input) && issue.input !== undefined && typeof issue.input === 'number'
          ? 'Please write a number, such as 12 or 12.5.'
          : 'Please fill in a number.';
      return 'Please fill this in.';
    case 'too_small':
      if (issue.origin === 'string')
        return Number(issue.minimum) <= 1 ? 'Please fill this in.' : `At least ${issue.minimum} characters.`;
      if (issue.origin === 'array') return `At least ${issue.minimum}.`;
      return issue.inclusive === false
        ? `Must be more than ${issue.minimum}.`
        : `Must be at least ${issue.minimum}.`;
    case 'too_big':
      if (issue.origin === 'string') return `At most ${issue.maximum} characters.`;
      if (issue.origin === 'array') return `At most ${issue.maximum}.`;
      return issue.inclusive === false
        ? `Must be less than ${issue.maximum}.`
        : `Must be at most ${issue.maximum}.`;
    case 'invalid_format':
      return issue.format === 'email'
        ? 'Please write an e-mail address, such as name@example.com.'
        : 'This is not in the form expected.';
    case 'invalid_value':
    case 'invalid_union':
      return 'Please choose one.';
    default:
      return undefined;
  }
}

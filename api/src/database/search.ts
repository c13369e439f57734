/** An ILIKE pattern that finds the text anywhere, taken literally. */
export const containing = (text: string): string => `%${text.replace(/[\\%_]/g, '\\$&')}%`;

/**
 * Where the files of a sheet are kept. Keys start with the company's id, so that its files are one prefix;
 * `attempt` keeps a file that a half-finished attempt left from being taken for that of another.
 */
export const sheetPrefix = (companyId: string, sheetId: string): string => `${companyId}/sheets/${sheetId}/`;
export const originalKey = (companyId: string, sheetId: string): string =>
  `${sheetPrefix(companyId, sheetId)}original`;
export const pagesPrefix = (companyId: string, sheetId: string): string =>
  `${sheetPrefix(companyId, sheetId)}pages/`;
export const pageKey = (companyId: string, sheetId: string, page: number): string =>
  `${pagesPrefix(companyId, sheetId)}${page}.jpg`;
export const imageKey = (companyId: string, sheetId: string, attempt: string): string =>
  `${sheetPrefix(companyId, sheetId)}image-${attempt}`;
export const thumbnailKey = (companyId: string, sheetId: string, attempt: string): string =>
  `${sheetPrefix(companyId, sheetId)}thumbnail-${attempt}`;

import type { Answer } from './api/client';

/** A yard photo or plot plan as the server keeps it. */
export type Sheet = Answer<'/api/sheets/{id}', 'get'>;
export type SheetView = Sheet['view'];

/** The server is still at work on it: worth asking again. */
export const isUnderWay = (sheet: Sheet): boolean =>
  sheet.status === 'uploaded' || sheet.status === 'processing';

import { AppError } from '../http/app-error.js';
import type { MoneyDocument } from './money-document.js';

/** An invoice, a receipt or the note of a refund as a PDF. The same input gives the same bytes. */
export async function moneyPdf(_document: MoneyDocument): Promise<Buffer> {
  throw new AppError(501, 'not-built', 'This can’t be put on paper yet.');
}

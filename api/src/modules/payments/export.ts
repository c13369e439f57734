import { minorDigits } from '@lampwright/geometry/price';
import Papa from 'papaparse';
import type { BookLine } from './money-documents.repository.js';

const columns = [
  'date',
  'kind',
  'number',
  'job',
  'client',
  'method',
  'amount',
  'tax',
  'currency',
  'reference',
] as const;

/**
 * Invoices, receipts and refunds as CSV (RFC 4180) for bookkeeping, whatever the company's locale: dates as
 * year-month-day, amounts with a point, refunds negative. `tax` is the tax held in `amount`.
 */
export function bookCsv(lines: readonly BookLine[]): string {
  const rows = lines.map(({ kind, number, amountMinor, currency, content, method, reference }) => {
    const { date, jobName, client } = content.paper;
    const sign = kind === 'refund' ? -1 : 1;
    return {
      date,
      kind,
      number: String(number),
      job: guarded(jobName),
      client: guarded(client.name),
      method: method ?? '',
      amount: decimal(sign * amountMinor, currency),
      tax: decimal(sign * content.taxMinor, currency),
      currency,
      reference: guarded(reference),
    };
  });
  return `${Papa.unparse({ fields: [...columns], data: rows }, { newline: '\r\n' })}\r\n`;
}

/** A spreadsheet takes a text that begins like this for a formula, and runs it. */
const LIKE_A_FORMULA = /^[\s]*[=+\-@]/;

function guarded(text: string): string {
  return LIKE_A_FORMULA.test(text) || /^[\t\r\n]/.test(text) ? `'${text}` : text;
}

/** Exact: the digits are moved as text. */
function decimal(amountMinor: number, currency: string): string {
  const digits = minorDigits(currency);
  const sign = amountMinor < 0 ? '-' : '';
  const text = String(Math.abs(amountMinor)).padStart(digits + 1, '0');
  const whole = text.slice(0, text.length - digits);
  return digits === 0 ? `${sign}${whole}` : `${sign}${whole}.${text.slice(-digits)}`;
}

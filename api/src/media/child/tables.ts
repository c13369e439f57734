import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import ExcelJS from 'exceljs';
import Papa from 'papaparse';
import { MAX_CELL_CHARACTERS, MAX_TABLE_COLUMNS, MAX_TABLE_ROWS } from '../limits.js';
import { Refusal } from './refusal.js';

/** Reads a table into rows of texts, heads first, without empty rows and columns; writes them as JSON. */
export async function readTable(input: string, folder: string, format: 'csv' | 'xlsx'): Promise<string> {
  const rows = tidy(format === 'csv' ? await readCsv(input) : await readWorkbook(input));
  if (rows.length < 2)
    throw new Refusal('table-empty', 'This table has no rows below the heads of its columns.');
  if (rows.length - 1 > MAX_TABLE_ROWS)
    throw new Refusal(
      'table-too-long',
      `This table has ${rows.length - 1} rows; at most ${MAX_TABLE_ROWS} are taken at once. Split it in parts.`,
    );
  const columns = Math.max(...rows.map((row) => row.length));
  if (columns > MAX_TABLE_COLUMNS)
    throw new Refusal(
      'table-too-wide',
      `This table has ${columns} columns; at most ${MAX_TABLE_COLUMNS} are taken.`,
    );
  const file = join(folder, 'table.json');
  await writeFile(file, JSON.stringify(rows.map((row) => padded(row, columns))));
  return file;
}

const padded = (row: readonly string[], columns: number): string[] =>
  Array.from({ length: columns }, (_, i) => row[i] ?? '');

async function readCsv(input: string): Promise<string[][]> {
  const parsed = Papa.parse<string[]>(textOf(await readFile(input)), { skipEmptyLines: 'greedy' });
  // What it could only guess (a delimiter, a row shorter than others) is no fault of the file.
  const broken = parsed.errors.find(({ type }) => type === 'Quotes');
  if (broken)
    throw new Refusal(
      'table-damaged',
      `A quotation mark in line ${(broken.row ?? 0) + 1} of the file is not closed.`,
    );
  return parsed.data;
}

/** UTF-8, UTF-16 with its mark, or else the Western code page that spreadsheets still write. */
function textOf(bytes: Buffer): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return new TextDecoder('utf-16be').decode(bytes);
  if (bytes.includes(0)) throw new Refusal('table-type', 'This file is no table; send CSV or XLSX.');
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
}

async function readWorkbook(input: string): Promise<string[][]> {
  const workbook = new ExcelJS.Workbook();
  try {
    await workbook.xlsx.readFile(input);
  } catch {
    throw new Refusal('table-damaged', 'This workbook is damaged and could not be read.');
  }
  const sheet = workbook.worksheets.find(({ actualRowCount }) => actualRowCount > 0);
  const rows: string[][] = [];
  sheet?.eachRow((row) => {
    const cells: string[] = [];
    row.eachCell({ includeEmpty: true }, (cell, column) => {
      if (column <= MAX_TABLE_COLUMNS + 1) cells[column - 1] = cellText(cell.value);
    });
    rows.push(Array.from(cells, (text) => text ?? ''));
  });
  return rows;
}

/** A cell's value as a person reads it; of a formula, what it last came to. */
function cellText(value: ExcelJS.CellValue): string {
  if (value === null || value === undefined) return '';
  if (value instanceof Date) return value.toISOString().slice(0, 10);
  if (typeof value !== 'object') return String(value);
  if ('richText' in value) return value.richText.map(({ text }) => text).join('');
  if ('hyperlink' in value) return cellText(value.text as ExcelJS.CellValue);
  if ('result' in value) return cellText(value.result as ExcelJS.CellValue);
  return '';
}

function tidy(rows: readonly (readonly string[])[]): string[][] {
  const full = rows
    .map((row) => row.map((cell) => cell.trim().slice(0, MAX_CELL_CHARACTERS)))
    .filter((row) => row.some((cell) => cell !== ''));
  const width = Math.max(0, ...full.map((row) => row.length));
  const used = Array.from({ length: width }, (_, i) => full.some((row) => (row[i] ?? '') !== ''));
  return full.map((row) => Array.from({ length: width }, (_, i) => row[i] ?? '').filter((_, i) => used[i]));
}

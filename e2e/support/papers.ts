import { execFile } from 'node:child_process';
import { type APIRequestContext, expect } from '@playwright/test';
import type { Mail } from './mail.js';

/** The words of a PDF, lines as they stand on paper, white space run together. */
export async function textOfPdf(pdf: Buffer): Promise<string> {
  const text = await new Promise<string>((resolve, reject) => {
    const reader = execFile('pdftotext', ['-layout', '-', '-'], (error, stdout) =>
      error ? reject(error) : resolve(stdout),
    );
    reader.stdin?.end(pdf);
  });
  return text.replace(/\s+/g, ' ');
}

/** The words of the one PDF that came with a mail, taken from where the local mail shows it. */
export async function paperOf(request: APIRequestContext, mail: Mail): Promise<string> {
  expect(mail.attachments.map(({ type }) => type)).toEqual(['application/pdf']);
  return paperAt(request, `/dev/mail/messages/${mail.id}/attachments/0`);
}

export async function paperAt(request: APIRequestContext, url: string): Promise<string> {
  const answer = await request.get(url);
  expect(answer.status(), url).toBe(200);
  expect(answer.headers()['content-type']).toBe('application/pdf');
  return textOfPdf(await answer.body());
}

import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';

/** A file to be sent, with the tag that names its content. */
export interface StoredFile {
  readonly etag: string;
  /** What a browser calls it when it is saved: plain letters, digits and dashes. */
  readonly name?: string;
  /** To be saved rather than shown. */
  readonly save?: true;
  open(): Promise<{ readonly stream: Readable; readonly length: number; readonly type: string }>;
}

/**
 * A stored file opened by itself runs nothing and loads nothing, and its page has no origin of ours. Papers
 * have no `sandbox`: browsers show them in a viewer that is a page of its own, and Chromium's does not open
 * in a sandbox. A PDF can't reach our pages from there.
 */
const LOCKED = "default-src 'none'; sandbox";
const LOCKED_PAPER = "default-src 'none'";

/**
 * Streams a file. `no-cache` has the browser ask before each use, and only its own cache may keep a copy:
 * after sign-out or on a shared proxy the picture is not to be had, yet an unchanged one is sent only once.
 */
export async function sendFile(file: StoredFile, request: Request, response: Response): Promise<void> {
  response.set({
    'Cache-Control': 'private, no-cache',
    Vary: 'Cookie',
    ETag: file.etag,
    'X-Content-Type-Options': 'nosniff',
    'Content-Disposition': disposition(file),
  });
  if (request.fresh) {
    // What a 304 says replaces what the browser keeps: the file's own policy stays.
    response.removeHeader('Content-Security-Policy');
    response.status(304).end();
    return;
  }
  const { stream, length, type } = await file.open();
  response.set({
    'Content-Type': type,
    'Content-Length': String(length),
    'Content-Security-Policy': type === 'application/pdf' ? LOCKED_PAPER : LOCKED,
  });
  try {
    await pipeline(stream, response);
  } catch (error) {
    // A reader who went away is no failure of ours.
    if (!request.destroyed && !response.destroyed) throw error;
  }
}

function disposition({ name, save }: StoredFile): string {
  const how = save ? 'attachment' : 'inline';
  return name === undefined ? how : `${how}; filename="${name}"`;
}

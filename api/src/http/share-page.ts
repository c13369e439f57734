import { readFile } from 'node:fs/promises';
import { type RequestHandler, Router } from 'express';
import { z } from 'zod';
import type { Guest } from '../access/guest.js';
import type { LinkGate } from '../access/link-gate.js';
import { escapeHtml } from '../ports/mail/letter.js';
import { AppError } from './app-error.js';
import { BUILT_EDITOR } from './editor-files.js';

/** What the page says before its script runs. */
export interface PageHead {
  readonly title: string;
  /** The picture that it shows first, and a lighter one for the screens of a media query. */
  readonly picture: { readonly url: string; readonly light: { url: string; media: string } } | null;
}

/** Anything but a sentence to read would ask for more. */
const waiting = (sentence: string) =>
  `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><meta name="robots" content="noindex, nofollow"><title>Please wait</title></head><body style="font-family:sans-serif;max-width:36rem;margin:4rem auto;padding:0 1rem"><h1 style="font-size:1.25rem">Please wait a little</h1><p>${escapeHtml(sentence)}</p></body></html>`;

/** The addresses of these pages are kept by nobody and told to nobody. */
const quiet = {
  'Cache-Control': 'no-store',
  'Referrer-Policy': 'no-referrer',
  'X-Robots-Tag': 'noindex, nofollow',
};

const linkIdSchema = z.uuid();

const meta = (name: string, content: string) =>
  `<meta name="lampwright-${name}" content="${escapeHtml(content)}">`;

/**
 * Serves the page of a homeowner's link, `/p/<token>`, and swaps the token for the link's cookie; and
 * `/p/back/<link id>`, for whoever has that cookie. It writes nothing: mail scanners open links too. For links that
 * don't exist or are over, the same page says so.
 */
export function sharePage(
  gate: Pick<LinkGate, 'byToken' | 'setCookie'>,
  facts: { headOf(guest: Guest): Promise<PageHead> },
  folder = BUILT_EDITOR,
): RequestHandler {
  const router = Router();
  // Back from the card service, which is not told the token: the cookie of the link lets them in, in the browser
  // that they left from. The page says the same of every id; only the cookie opens anything.
  router.get('/p/back/:linkId', async (request, response, next) => {
    const shell = await readFile(`${folder}/home.html`, 'utf8').catch(() => null);
    if (shell === null) return next();
    response.set(quiet).type('html');
    const { linkId } = request.params;
    if (!linkIdSchema.safeParse(linkId).success)
      response.status(404).send(inHead(shell, meta('state', 'unknown')));
    else response.send(inHead(shell, meta('link', linkId) + meta('state', 'back')));
  });
  router.get('/p/:token', async (request, response, next) => {
    const shell = await readFile(`${folder}/home.html`, 'utf8').catch(() => null);
    if (shell === null) return next();
    response.set(quiet);
    try {
      const guest = await gate.byToken(request.params.token, request.ip ?? '');
      const head = await facts.headOf(guest);
      gate.setCookie(response, guest.linkId);
      response.type('html').send(filled(shell, guest.linkId, head));
    } catch (error) {
      if (!(error instanceof AppError)) return next(error);
      response.status(error.status).set(error.headers).type('html');
      if (error.status === 429) response.send(waiting(error.message));
      else response.send(inHead(shell, meta('state', error.status === 410 ? 'gone' : 'unknown')));
    }
  });
  return router;
}

function filled(shell: string, linkId: string, { title, picture }: PageHead): string {
  const named = shell.replace(/<title>[^<]*<\/title>/, () => `<title>${escapeHtml(title)}</title>`);
  const hints = picture
    ? [
        pictureHint(picture.light.url, picture.light.media),
        pictureHint(picture.url, `not all and ${picture.light.media}`),
      ]
    : [];
  return inHead(named, [meta('link', linkId), ...hints].join(''));
}

const pictureHint = (url: string, media: string) =>
  `<link rel="preload" as="image" href="${escapeHtml(url)}" media="${escapeHtml(media)}" fetchpriority="high">`;

const inHead = (shell: string, tags: string): string => shell.replace('</head>', () => `${tags}</head>`);

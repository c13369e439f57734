import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import express, { type Request, type RequestHandler, type Response, Router } from 'express';

/** The folder of the built editor. */
export const BUILT_EDITOR = fileURLToPath(new URL('../../../editor/dist', import.meta.url));

/** Encodings of the copies that the build lays beside text files, smallest first, with their endings. */
const COPIES = [
  ['br', '.br'],
  ['gzip', '.gz'],
] as const;

/** An asset by its name, without any folder: nothing that leads out of theirs. */
const TEXT_ASSET = /^\/[\w.-]+\.(js|css|svg)$/;

/**
 * Serves the built editor: hashed assets for good, the page itself asked for anew each time. Text goes out
 * compressed wherever the build made copies and the caller takes them.
 */
export function editorFiles(folder = BUILT_EDITOR): RequestHandler {
  const router = Router();
  router.use('/assets', (request, response, next) => {
    if (TEXT_ASSET.test(request.path)) {
      const file = `${folder}/assets${request.path}`;
      request.url = request.path + chooseCopy(file, request, response);
    }
    next();
  });
  router.use(
    '/assets',
    express.static(`${folder}/assets`, { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  router.use(express.static(folder, { index: false, maxAge: 0 }));
  router.use((request, response, next) => {
    const file = `${folder}/index.html`;
    const isPage =
      (request.method === 'GET' || request.method === 'HEAD') &&
      !/^\/(api|dev)(\/|$)/.test(request.path) &&
      existsSync(file);
    if (!isPage) return next();
    response.set('Cache-Control', 'no-cache').sendFile(file + chooseCopy(file, request, response));
  });
  return router;
}

/**
 * The ending of the copy to be sent in place of a file, with its headers set; empty for the file itself.
 * Each copy is a file with a tag, a length and byte ranges of its own, as it must be: they name the
 * encoded bytes.
 */
function chooseCopy(file: string, request: Request, response: Response): string {
  const copies = COPIES.filter(([, ending]) => existsSync(file + ending));
  if (copies.length === 0) return '';
  response.vary('Accept-Encoding');
  // One by one: browsers name gzip before br without liking it better.
  const copy = copies.find(([encoding]) => request.acceptsEncodings(encoding) === encoding);
  if (!copy) return '';
  const [encoding, ending] = copy;
  response.type(file.slice(file.lastIndexOf('.'))).set('Content-Encoding', encoding);
  return ending;
}

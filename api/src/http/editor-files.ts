import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import express, { type RequestHandler, Router } from 'express';

/** The folder of the built editor. */
export const BUILT_EDITOR = fileURLToPath(new URL('../../../editor/dist', import.meta.url));

/** Serves the built editor: hashed assets for good, the page itself asked for anew each time. */
export function editorFiles(folder = BUILT_EDITOR): RequestHandler {
  const router = Router();
  router.use(
    '/assets',
    express.static(`${folder}/assets`, { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  router.use(express.static(folder, { index: false, maxAge: 0 }));
  router.use((request, response, next) => {
    const isPage =
      (request.method === 'GET' || request.method === 'HEAD') &&
      !/^\/(api|dev)(\/|$)/.test(request.path) &&
      existsSync(`${folder}/index.html`);
    if (!isPage) return next();
    response.set('Cache-Control', 'no-cache').sendFile(`${folder}/index.html`);
  });
  return router;
}

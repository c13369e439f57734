import type { Plugin } from 'vite';

/** The faces that the homeowner's page is set in from its first line on. */
const FACE = /work-sans-latin-(400|600)-normal-[\w-]+\.woff2$/;

/** Has browsers ask for the faces of the homeowner's page with its script, rather than after its styles. */
export const homeFonts = (): Plugin => ({
  name: 'lampwright:home-fonts',
  apply: 'build',
  transformIndexHtml: {
    order: 'post',
    handler: (_html, { filename, bundle }) => {
      if (!filename.endsWith('/home.html')) return [];
      const faces = Object.keys(bundle ?? {}).filter((name) => FACE.test(name));
      if (faces.length !== 2)
        throw new Error(`The page's faces are not what it preloads: ${faces.join(', ')}.`);
      return faces.map((name) => ({
        tag: 'link',
        attrs: { rel: 'preload', as: 'font', type: 'font/woff2', crossorigin: '', href: `/${name}` },
        injectTo: 'head',
      }));
    },
  },
});

/** What the page's answer is made of, besides its HTML. Not its content policy: vite's own scripts are inline. */
const HEADERS = ['cache-control', 'content-type', 'referrer-policy', 'x-robots-tag', 'retry-after'];

/**
 * In development the homeowner's page comes from the API too, which fills in the link and sets its cookie, and
 * passes through vite on its way, so that it reloads on change.
 */
export const homePage = (apiUrl: string): Plugin => ({
  name: 'lampwright:home-page',
  apply: 'serve',
  configureServer(server) {
    server.middlewares.use(async (request, response, next) => {
      const address = request.originalUrl ?? request.url ?? '/';
      if (!/^\/p\/[^/?]+/.test(address)) return next();
      try {
        const answer = await fetch(new URL(address, apiUrl), { method: request.method ?? 'GET' });
        const html = await server.transformIndexHtml('/home.html', await answer.text(), address);
        response.statusCode = answer.status;
        for (const name of HEADERS) {
          const value = answer.headers.get(name);
          if (value !== null) response.setHeader(name, value);
        }
        response.setHeader('Set-Cookie', answer.headers.getSetCookie());
        response.end(html);
      } catch (error) {
        next(error);
      }
    });
  },
});

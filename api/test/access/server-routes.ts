import type { NestExpressApplication } from '@nestjs/platform-express';

interface Layer {
  readonly route?: { readonly path: string; readonly methods: Readonly<Record<string, boolean>> } | undefined;
  readonly handle?: unknown;
}

/** Routers are functions that carry a stack of layers. */
const hasStack = (handler: unknown): handler is { readonly stack: readonly Layer[] } =>
  (typeof handler === 'function' || (typeof handler === 'object' && handler !== null)) &&
  'stack' in handler &&
  Array.isArray(handler.stack);

/** Every route of the running server as "METHOD /path", routers inside of routers included. */
export function serverRoutes(app: NestExpressApplication): string[] {
  const express: { readonly router: unknown } = app.getHttpAdapter().getInstance();
  return [...new Set(routesOf(express.router))].sort();
}

function routesOf(handler: unknown): string[] {
  if (!hasStack(handler)) return [];
  return handler.stack.flatMap(({ route, handle }) =>
    route
      ? Object.keys(route.methods).map((method) => `${method.toUpperCase()} ${route.path}`)
      : routesOf(handle),
  );
}

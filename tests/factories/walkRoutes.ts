import type { Express } from 'express';

type Layer = {
  route?: { path: string; stack: { method?: string }[] };
  handle: { stack?: Layer[] };
  match: (path: string) => boolean;
};

/** Every route of an app, as "METHOD /path", found by walking its routers. What answers all other methods of an address
 * with a refusal is no route. @throws Error when a router hangs where this walk does not know its address
 */
export function walkRoutes(app: Express): string[] {
  const { stack } = app.router as unknown as { stack: Layer[] };
  return stack.flatMap((layer) => {
    if (layer.route) return routesOf(layer, '');
    if (!layer.handle.stack) return [];
    if (!layer.match('/api/x') || layer.match('/x')) throw new Error('a router that is not at /api');
    return layer.handle.stack.flatMap((inner) => {
      if (inner.handle.stack && !inner.route) throw new Error('a router within a router');
      return inner.route ? routesOf(inner, '/api') : [];
    });
  });
}

const routesOf = ({ route }: Layer, prefix: string): string[] =>
  [...new Set(route?.stack.flatMap(({ method }) => (method ? [method] : [])))].map(
    (method) => `${method.toUpperCase()} ${prefix}${route?.path}`,
  );

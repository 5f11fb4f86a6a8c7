import type { Express, Router } from 'express';

interface Layer {
  route?: { path: string; methods: Record<string, boolean> };
  handle: { stack?: Layer[] };
}

function collect(layers: Layer[]): string[] {
  return layers.flatMap(({ route, handle }) => {
    if (!route) return collect(handle.stack ?? []);
    return Object.keys(route.methods)
      .filter((method) => method !== '_all')
      .map((method) => `${method.toUpperCase()} ${route.path}`);
  });
}

/** Every route that Express really serves, below its mount point: `GET /projects/:projectId`. */
export const expressRoutes = (app: Express): string[] =>
  collect((app.router as Router & { stack: Layer[] }).stack).sort();

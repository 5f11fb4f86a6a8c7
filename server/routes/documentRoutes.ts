import { z } from 'zod';
import { route, type Route } from './Route.js';

const documentSchema = z.record(z.string(), z.unknown());

export function documentRoutes(document: Record<string, unknown>): Route[] {
  return [
    route({
      method: 'get',
      path: '/openapi.json',
      tag: 'System',
      summary: 'This document',
      access: 'anyone',
      success: { status: 200, schema: documentSchema },
      handle: () => document,
    }),
  ];
}

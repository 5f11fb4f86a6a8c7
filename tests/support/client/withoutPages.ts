import type { RouteRecordRaw } from 'vue-router';

/** The application's routes with empty pages: a test of one part does not load every view. */
export const withoutPages = (routes: RouteRecordRaw[]): RouteRecordRaw[] =>
  routes.map((route) => ({ ...route, component: { render: () => null } }) as RouteRecordRaw);

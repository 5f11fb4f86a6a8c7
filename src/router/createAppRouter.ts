import { nextTick } from 'vue';
import { createRouter, createWebHistory, type RouteLocationNormalized, type Router } from 'vue-router';
import { handleSessionLost } from '@/api/apiClient';
import { useSessionStore } from '@/stores/useSessionStore';
import { routes } from './routes';

/** Refuses what the person may not see; the server refuses it as well. */
async function guard(to: RouteLocationNormalized) {
  const session = useSessionStore();
  await session.load();
  if (to.meta.isPublic) return to.name === 'signIn' && session.isSignedIn ? { name: 'start' } : true;
  if (!session.isSignedIn) return { name: 'signIn', query: to.fullPath === '/' ? {} : { next: to.fullPath } };
  if (to.meta.isAdminOnly && !session.isAdmin)
    return { name: 'notFound', params: { path: to.path.slice(1).split('/') } };
  return true;
}

/** A page change is announced by moving the focus to its heading, as a page load would. */
async function announce(to: RouteLocationNormalized, from: RouteLocationNormalized): Promise<void> {
  document.title = `${to.meta.title} · Overfold`;
  if (from.matched.length === 0 || to.path === from.path) return;
  await nextTick();
  document.querySelector<HTMLElement>('h1')?.focus();
}

export function createAppRouter(): Router {
  const router = createRouter({
    history: createWebHistory(),
    routes,
    scrollBehavior: (to, from, saved) => saved ?? (to.path === from.path ? undefined : { top: 0 }),
  });
  router.beforeEach(guard);
  router.afterEach((to, from) => void announce(to, from));
  handleSessionLost(() => {
    useSessionStore().forget();
    const { fullPath, meta } = router.currentRoute.value;
    if (!meta.isPublic) void router.push({ name: 'signIn', query: { next: fullPath, ended: '1' } });
  });
  return router;
}

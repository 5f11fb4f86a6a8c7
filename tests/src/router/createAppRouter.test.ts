import { createPinia, setActivePinia } from 'pinia';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { createAppRouter } from '@/router/createAppRouter';
import type * as routesModule from '@/router/routes';
import { useSessionStore } from '@/stores/useSessionStore';
import { sessionUser } from '../../support/client/sessionUser';

vi.mock('@/router/routes', async (original) => {
  const { withoutPages } = await import('../../support/client/withoutPages');
  return { routes: withoutPages((await original<typeof routesModule>()).routes) };
});

function signIn(isAdmin: boolean): void {
  const session = useSessionStore();
  session.user = sessionUser({ isAdmin });
  session.isKnown = true;
}

async function goTo(path: string) {
  const router = createAppRouter();
  await router.push(path);
  return router.currentRoute.value;
}

describe('createAppRouter', () => {
  beforeEach(() => setActivePinia(createPinia()));

  it('sends whoever is not signed in to sign in and keeps where they wanted to go', async () => {
    expect(await goTo('/batches/7?page=2')).toMatchObject({ name: 'signIn', query: { next: '/batches/7?page=2' } });
  });

  it('shows public pages without signing in', async () => {
    expect((await goTo('/forgot')).name).toBe('forgot');
  });

  it('hides administration from those who are no administrators', async () => {
    signIn(false);
    expect((await goTo('/admin/users')).name).toBe('notFound');
  });

  it('shows administration to administrators', async () => {
    signIn(true);
    expect((await goTo('/admin/users')).name).toBe('adminUsers');
  });

  it('sends whoever is signed in from signing in to the start', async () => {
    signIn(false);
    expect((await goTo('/sign-in')).name).toBe('start');
  });
});

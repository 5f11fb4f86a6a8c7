import { createPinia, setActivePinia } from 'pinia';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { useSessionStore } from '@/stores/useSessionStore';
import { jsonAnswer } from '../../support/client/jsonAnswer';
import { sessionUser } from '../../support/client/sessionUser';

const credentials = { email: 'ines@marram.example', password: 'a long password' };

describe('useSessionStore', () => {
  beforeEach(() => setActivePinia(createPinia()));

  it('asks nothing in a browser that never signed in', async () => {
    const session = useSessionStore();
    await session.load();
    expect(fetch).not.toHaveBeenCalled();
    expect(session).toMatchObject({ isKnown: true, isSignedIn: false });
  });

  it('keeps the roles of whoever signs in', async () => {
    vi.mocked(fetch).mockResolvedValue(jsonAnswer({ user: sessionUser() }));
    const session = useSessionStore();
    await session.signIn(credentials);
    expect(session.isSignedIn).toBe(true);
    expect(session.hasRole('p1', 'reviewer')).toBe(true);
    expect(session.hasRole('p1', 'analyst')).toBe(false);
    expect(session.rolesIn('p2')).toEqual([]);
  });

  it('forgets who was signed in even if the server fails', async () => {
    vi.mocked(fetch).mockResolvedValueOnce(jsonAnswer({ user: sessionUser() }));
    const session = useSessionStore();
    await session.signIn(credentials);
    await expect(session.signOut()).rejects.toMatchObject({ code: 'UNREACHABLE' });
    expect(session.isSignedIn).toBe(false);
  });
});

import type { ProjectRole, SessionUser, SignIn } from '@shared/schemas/account.js';
import { useStorage } from '@vueuse/core';
import { defineStore } from 'pinia';
import { computed, ref } from 'vue';
import { ApiError } from '@/api/ApiError';
import { sessionApi } from '@/api/sessionApi';

/** Who is signed in. The tokens are in cookies that scripts can't read; this holds only the person and their roles. */
export const useSessionStore = defineStore('session', () => {
  const user = ref<SessionUser | null>(null);
  const isKnown = ref(false);
  /** Whether this browser may hold a session: without it the server need not be asked. No secret, only a hint. */
  const mayBeSignedIn = useStorage('overfold.mayBeSignedIn', false);

  const isSignedIn = computed(() => user.value !== null);
  const isAdmin = computed(() => user.value?.isAdmin === true);

  /** Asks the server once who is signed in; nobody is an answer, no answer is an error. */
  async function load(): Promise<void> {
    if (isKnown.value) return;
    if (!mayBeSignedIn.value) {
      forget();
      return;
    }
    try {
      user.value = (await sessionApi.current()).user;
    } catch (error) {
      if (!(error instanceof ApiError) || error.status !== 401) throw error;
      forget();
    }
    isKnown.value = true;
  }

  async function reload(): Promise<void> {
    isKnown.value = false;
    await load();
  }

  async function signIn(credentials: SignIn): Promise<void> {
    user.value = (await sessionApi.signIn(credentials)).user;
    mayBeSignedIn.value = true;
    isKnown.value = true;
  }

  function forget(): void {
    user.value = null;
    mayBeSignedIn.value = false;
    isKnown.value = true;
  }

  async function signOut(): Promise<void> {
    try {
      await sessionApi.signOut();
    } finally {
      forget();
    }
  }

  const rolesIn = (projectId: string): ProjectRole[] =>
    user.value?.memberships.find((membership) => membership.projectId === projectId)?.roles ?? [];
  const hasRole = (projectId: string, role: ProjectRole): boolean => rolesIn(projectId).includes(role);

  return { user, isKnown, isSignedIn, isAdmin, load, reload, signIn, signOut, forget, rolesIn, hasRole };
});

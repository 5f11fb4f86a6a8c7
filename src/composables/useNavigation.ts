import { computed } from 'vue';
import { useSessionStore } from '@/stores/useSessionStore';
import { usePublicSettings } from './usePublicSettings';

/** The main menu's entries: for whoever is signed in, and the help for everybody. */
export function useNavigation() {
  const session = useSessionStore();
  const { data: settings } = usePublicSettings();
  const items = computed(() => [
    ...(session.isSignedIn
      ? [
          { to: '/projects', label: 'Projects' },
          { to: '/review', label: 'Review' },
        ]
      : []),
    ...(session.isAdmin
      ? [
          { to: '/admin/users', label: 'Users' },
          { to: '/admin/mail', label: 'Mail' },
        ]
      : []),
    ...(session.isSignedIn && settings.value?.isDemo ? [{ to: '/demo/mail', label: 'Caught mail' }] : []),
    { to: '/help', label: 'Help' },
  ]);
  return { items };
}

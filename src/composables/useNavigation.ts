import { computed } from 'vue';
import { useSessionStore } from '@/stores/useSessionStore';
import { usePublicSettings } from './usePublicSettings';

/** The main menu's entries for whoever is signed in. */
export function useNavigation() {
  const session = useSessionStore();
  const { data: settings } = usePublicSettings();
  const items = computed(() => [
    { to: '/projects', label: 'Projects' },
    { to: '/review', label: 'Review' },
    ...(session.isAdmin
      ? [
          { to: '/admin/users', label: 'Users' },
          { to: '/admin/mail', label: 'Mail' },
        ]
      : []),
    ...(settings.value?.isDemo ? [{ to: '/demo/mail', label: 'Caught mail' }] : []),
  ]);
  return { items };
}

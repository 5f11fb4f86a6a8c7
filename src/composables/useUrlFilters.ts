import { computed, type ComputedRef } from 'vue';
import { useRoute, useRouter } from 'vue-router';

/**
 * Filters kept in the address, so that Back, a reload and a sent link show the same. An empty value leaves the address;
 * any change of a filter goes back to the first page.
 */
export function useUrlFilters<Name extends string>(names: readonly Name[]) {
  const route = useRoute();
  const router = useRouter();
  const filters = computed(() =>
    Object.fromEntries(
      names.map((name) => {
        const value = route.query[name];
        return [name, typeof value === 'string' ? value : ''];
      }),
    ),
  ) as ComputedRef<Record<Name, string>>;
  const cursors = computed(() => {
    const pages = route.query.page;
    return typeof pages === 'string' && pages !== '' ? pages.split('~') : [];
  });

  const write = (changes: Record<string, string | null | undefined>): void => {
    const query = { ...route.query, ...changes };
    void router.replace({ query: Object.fromEntries(Object.entries(query).filter(([, value]) => value)) });
  };
  const setFilter = (name: Name, value: string | null | undefined): void => write({ [name]: value, page: null });
  const setCursors = (next: string[]): void => write({ page: next.join('~') });
  const clear = (): void => write(Object.fromEntries([...names, 'page'].map((name) => [name, null])));

  return { filters, cursors, setFilter, setCursors, clear };
}

import { useQuery, type QueryKey } from '@tanstack/vue-query';
import { computed, type MaybeRefOrGetter, toValue } from 'vue';
import { pollInterval } from './pollInterval';

interface PolledQueryOptions<T> {
  queryKey: MaybeRefOrGetter<QueryKey>;
  queryFn: () => Promise<T>;
  /** Whether the thing may still change by itself. */
  isLive: (data: T) => boolean;
}

/** A query that is asked again while its answer may still change, with growing pauses, and not in a hidden tab. */
export function usePolledQuery<T>({ queryKey, queryFn, isLive }: PolledQueryOptions<T>) {
  let last = '';
  let unchanged = 0;
  return useQuery({
    queryKey: computed(() => toValue(queryKey)),
    queryFn: async () => {
      const data = await queryFn();
      const text = JSON.stringify(data);
      unchanged = text === last ? unchanged + 1 : 0;
      last = text;
      return data;
    },
    refetchInterval: (query) => {
      const data = query.state.data as T | undefined;
      return data !== undefined && isLive(data) ? pollInterval(unchanged) : false;
    },
    refetchIntervalInBackground: false,
  });
}

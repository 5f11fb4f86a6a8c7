import { useQuery } from '@tanstack/vue-query';
import { systemApi } from '@/api/systemApi';

/** What the installation says of itself: demo or not, upload limits. Asked once. */
export function usePublicSettings() {
  return useQuery({ queryKey: ['settings'], queryFn: systemApi.settings, staleTime: Infinity });
}

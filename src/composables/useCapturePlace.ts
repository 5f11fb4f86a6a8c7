import { computed } from 'vue';
import { useRoute, useRouter } from 'vue-router';
import type { Range } from '@/components/charts/SpectrumModel';

const numberOf = (value: unknown): number => (typeof value === 'string' && value !== '' ? Number(value) : Number.NaN);

/** Channel and stretch of the spectrum, kept in the address: a sent link shows the same place. */
export function useCapturePlace() {
  const route = useRoute();
  const router = useRouter();
  const channel = computed(() => Math.max(0, Math.round(numberOf(route.query.channel)) || 0));
  const range = computed<Range | null>(() => {
    const fromHz = numberOf(route.query.from);
    const toHz = numberOf(route.query.to);
    return fromHz >= 0 && toHz > fromHz ? { fromHz, toHz } : null;
  });
  const write = (changes: Record<string, string | undefined>): void => {
    void router.replace({ query: { ...route.query, ...changes } });
  };
  const setChannel = (next: number): void =>
    write({ channel: next ? String(next) : undefined, from: undefined, to: undefined });
  const setRange = (next: Range | null): void =>
    write({
      from: next ? String(Number(next.fromHz.toPrecision(7))) : undefined,
      to: next ? String(Number(next.toHz.toPrecision(7))) : undefined,
    });
  return { channel, range, setChannel, setRange };
}

import { usePreferredDark, useStorage } from '@vueuse/core';
import { defineStore } from 'pinia';
import { computed } from 'vue';

export type ThemeChoice = 'system' | 'paper' | 'ink';

/** What a person chose for their own screen; kept in this browser. */
export const usePreferencesStore = defineStore('preferences', () => {
  const themeChoice = useStorage<ThemeChoice>('overfold.theme', 'system');
  const areKeysOn = useStorage<boolean>('overfold.reviewKeys', true);
  const prefersDark = usePreferredDark();

  const themeName = computed(() => {
    if (themeChoice.value !== 'system') return themeChoice.value;
    return prefersDark.value ? 'ink' : 'paper';
  });

  return { themeChoice, themeName, areKeysOn };
});

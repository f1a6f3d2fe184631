import { useLocalStorage, usePreferredDark } from '@vueuse/core';
import { defineStore } from 'pinia';
import { computed } from 'vue';

export const APPEARANCES = ['system', 'light', 'dark'] as const;
export type Appearance = (typeof APPEARANCES)[number];

export const APPEARANCE_LABELS: Record<Appearance, string> = { system: 'As the system', light: 'Light', dark: 'Dark' };

/** Light or dark, as the person chose on this device; follows the system until then. */
export const useAppearanceStore = defineStore('appearance', () => {
  const choice = useLocalStorage<Appearance>('limestead.appearance', 'system');
  const systemIsDark = usePreferredDark();
  const isDark = computed(() => (choice.value === 'system' ? systemIsDark.value : choice.value === 'dark'));
  return { choice, isDark };
});

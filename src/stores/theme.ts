import { defineStore } from 'pinia';
import { ref, watchEffect } from 'vue';

export const themes = ['system', 'light', 'dark'] as const;
export type Theme = (typeof themes)[number];

const key = 'trimwick.theme';

function remembered(): Theme {
  const stored = localStorage.getItem(key);
  return themes.find((theme) => theme === stored) ?? 'system';
}

/** Light or dark, kept in this browser; `system` follows the machine. */
export const useThemeStore = defineStore('theme', () => {
  const theme = ref<Theme>(remembered());
  watchEffect(() => {
    if (theme.value === 'system') delete document.documentElement.dataset.theme;
    else document.documentElement.dataset.theme = theme.value;
    localStorage.setItem(key, theme.value);
  });
  return { theme };
});

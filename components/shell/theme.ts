export const themes = ['system', 'light', 'dark'] as const;
export type Theme = (typeof themes)[number];

export const themeChoices: readonly { value: Theme; label: string }[] = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
];

/** The cookie that keeps the choice, so that the server renders the right theme at once. */
export const THEME_COOKIE = 'theme';

export const parseTheme = (value: string | undefined): Theme =>
  themes.find((theme) => theme === value) ?? 'system';

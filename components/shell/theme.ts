export const themeChoices = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
] as const;

export type Theme = (typeof themeChoices)[number]['value'];

/** The cookie that keeps the choice, so that the server renders the right theme at once. */
export const THEME_COOKIE = 'theme';

export const parseTheme = (value: string | undefined): Theme =>
  themeChoices.find((choice) => choice.value === value)?.value ?? 'system';

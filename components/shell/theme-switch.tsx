'use client';

import { useState } from 'react';
import { SelectField } from '../ui/field';
import { type Theme, themeChoices } from './theme';

interface ThemeSwitchProps {
  initial: Theme;
  /** Remembers the choice for the next page. */
  onChoose: (theme: Theme) => void;
}

export function ThemeSwitch({ initial, onChoose }: ThemeSwitchProps) {
  const [theme, setTheme] = useState<Theme>(initial);
  return (
    <SelectField
      label="Theme"
      className="w-48"
      choices={themeChoices}
      value={theme}
      onChange={(event) => {
        const chosen = event.target.value as Theme;
        setTheme(chosen);
        if (chosen === 'system') delete document.documentElement.dataset.theme;
        else document.documentElement.dataset.theme = chosen;
        onChoose(chosen);
      }}
    />
  );
}

'use client';

import { useAction } from '@/app/use-action';
import type { Theme } from '@/components/shell/theme';
import { ThemeSwitch } from '@/components/shell/theme-switch';
import { chooseThemeAction } from './actions';

/** Shows the theme at once; the cookie makes it stay. */
export function ThemeForm({ theme }: { theme: Theme }) {
  const { run, formError } = useAction(chooseThemeAction);
  return (
    <>
      <ThemeSwitch initial={theme} onChoose={(chosen) => run({ theme: chosen }, () => {})} />
      {formError ? (
        <p role="alert" className="mt-1 text-sm text-madder">
          {formError}
        </p>
      ) : null}
    </>
  );
}

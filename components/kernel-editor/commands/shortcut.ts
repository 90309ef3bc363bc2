/** Reading, matching and showing shortcuts such as `Mod+Shift+Z`. */

export interface KeyPress {
  key: string;
  ctrlKey: boolean;
  metaKey: boolean;
  altKey: boolean;
  shiftKey: boolean;
}

const modifiers = ['Mod', 'Alt', 'Shift'] as const;
type Modifier = (typeof modifiers)[number];

function parse(shortcut: string): { held: ReadonlySet<string>; key: string } {
  // A plus sign may itself be the key.
  const parts = shortcut.split(/\+(?=.)/);
  return { held: new Set(parts.slice(0, -1)), key: parts.at(-1) ?? '' };
}

/** Whether a key press is the shortcut. Shift is not asked for where it is what makes the sign (as in `?`). */
export function matches(shortcut: string, press: KeyPress): boolean {
  const { held, key } = parse(shortcut);
  const letter = key.length === 1;
  const sameKey = letter ? press.key.toLowerCase() === key.toLowerCase() : press.key === key;
  const isSign = letter && key.toLowerCase() === key.toUpperCase();
  return (
    sameKey &&
    held.has('Mod') === (press.ctrlKey || press.metaKey) &&
    held.has('Alt') === press.altKey &&
    (isSign || held.has('Shift') === press.shiftKey)
  );
}

/** Whether the shortcut needs Ctrl or ⌘: only such ones work outside the canvas (WCAG 2.2, 2.1.4). */
export const hasModifier = (shortcut: string): boolean => parse(shortcut).held.has('Mod');

const keyNames: Record<string, string> = {
  ArrowLeft: '←',
  ArrowRight: '→',
  ArrowUp: '↑',
  ArrowDown: '↓',
  Delete: 'Del',
};

/** The shortcut as it is shown, in the writing of the platform. */
export function shortcutLabel(shortcut: string, onMac = false): string {
  const { held, key } = parse(shortcut);
  const name: Record<Modifier, string> = onMac
    ? { Mod: '⌘', Alt: '⌥', Shift: '⇧' }
    : { Mod: 'Ctrl+', Alt: 'Alt+', Shift: 'Shift+' };
  const shownKey = keyNames[key] ?? (key.length === 1 ? key.toUpperCase() : key);
  return (
    modifiers
      .filter((modifier) => held.has(modifier))
      .map((modifier) => name[modifier])
      .join('') + shownKey
  );
}

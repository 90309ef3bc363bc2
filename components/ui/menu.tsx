'use client';

import { type KeyboardEvent, type ReactNode, useEffect, useRef, useState } from 'react';
import { buttonClass } from './button';

export interface MenuItem {
  id: string;
  label: string;
  shortcut?: string;
  disabled?: boolean;
  /** A link to follow (or a file to save) instead of something to do. */
  href?: string;
  onSelect?: () => void;
}

interface MenuProps {
  label: ReactNode;
  /** Read out where the label is only a symbol. */
  ariaLabel?: string;
  items: readonly MenuItem[];
  align?: 'left' | 'right';
  className?: string;
}

/** A button with a list of commands: arrows move, Escape closes, focus returns to the button. */
export function Menu({ label, ariaLabel, items, align = 'right', className = '' }: MenuProps) {
  const [open, setOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    if (!open) return;
    root.current?.querySelector<HTMLElement>('[role="menuitem"]')?.focus();
    const closeOutside = (event: PointerEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false);
    };
    document.addEventListener('pointerdown', closeOutside);
    return () => document.removeEventListener('pointerdown', closeOutside);
  }, [open]);

  const close = () => {
    setOpen(false);
    button.current?.focus();
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const entries = [...(root.current?.querySelectorAll<HTMLElement>('[role="menuitem"]') ?? [])];
    const at = entries.indexOf(document.activeElement as HTMLElement);
    const step = event.key === 'ArrowDown' ? 1 : event.key === 'ArrowUp' ? -1 : 0;
    if (event.key === 'Escape') close();
    else if (step !== 0) entries[(at + step + entries.length) % entries.length]?.focus();
    else if (event.key === 'Home') entries[0]?.focus();
    else if (event.key === 'End') entries.at(-1)?.focus();
    else return;
    event.preventDefault();
    event.stopPropagation();
  };
  return (
    <div ref={root} className={`relative ${className}`}>
      <button
        ref={button}
        type="button"
        className={buttonClass('quiet', 'min-w-8 hover:bg-indigo-wash')}
        aria-haspopup="menu"
        aria-expanded={open}
        aria-label={ariaLabel}
        onClick={() => setOpen(!open)}
      >
        {label}
      </button>
      {open ? (
        <div
          role="menu"
          tabIndex={-1}
          onKeyDown={onKeyDown}
          className={`absolute z-40 mt-1 min-w-48 rounded-md border border-rule bg-surface py-1 shadow-lg ${
            align === 'right' ? 'right-0' : 'left-0'
          }`}
        >
          {items.map((item) => (
            <MenuEntry key={item.id} item={item} onDone={close} />
          ))}
        </div>
      ) : null}
    </div>
  );
}

function MenuEntry({ item, onDone }: { item: MenuItem; onDone: () => void }) {
  const className =
    'flex min-h-8 w-full items-center justify-between gap-6 px-3 py-1 text-left text-sm hover:bg-indigo-wash focus:bg-indigo-wash aria-disabled:opacity-55';
  const content = (
    <>
      <span>{item.label}</span>
      {item.shortcut ? <span className="font-mono text-xs text-quiet">{item.shortcut}</span> : null}
    </>
  );
  if (item.href) {
    return (
      <a role="menuitem" tabIndex={-1} href={item.href} className={className} onClick={onDone}>
        {content}
      </a>
    );
  }
  return (
    <button
      role="menuitem"
      type="button"
      tabIndex={-1}
      className={className}
      aria-disabled={item.disabled || undefined}
      onClick={() => {
        if (item.disabled) return;
        onDone();
        item.onSelect?.();
      }}
    >
      {content}
    </button>
  );
}

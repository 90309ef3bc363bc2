'use client';

import { type ReactNode, useEffect, useId, useRef } from 'react';
import { Button, type ButtonLook } from './button';

interface DialogProps {
  open: boolean;
  title: string;
  onClose: () => void;
  children: ReactNode;
  /** `wide` for tables and previews. */
  size?: 'narrow' | 'wide';
}

/** A modal dialog on the platform's own element: it traps focus, closes on Escape and gives focus back. */
export function Dialog({ open, title, onClose, children, size = 'narrow' }: DialogProps) {
  const element = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = element.current;
    if (!dialog) return;
    if (open && !dialog.open) dialog.showModal();
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog
      ref={element}
      aria-labelledby={titleId}
      onClose={onClose}
      className={`m-auto max-h-[90dvh] w-[calc(100vw-2rem)] overflow-auto rounded-md border border-rule bg-surface p-5 text-ink shadow-xl ${
        size === 'wide' ? 'max-w-3xl' : 'max-w-md'
      }`}
    >
      {open ? (
        <>
          <div className="mb-3 flex items-start justify-between gap-4">
            <h2 id={titleId} className="text-lg font-semibold">
              {title}
            </h2>
            <button
              type="button"
              onClick={onClose}
              className="-mt-1 -mr-1 min-h-8 min-w-8 rounded"
              aria-label="Close"
            >
              ✕
            </button>
          </div>
          {children}
        </>
      ) : null}
    </dialog>
  );
}

interface ConfirmDialogProps {
  open: boolean;
  title: string;
  children: ReactNode;
  confirmLabel: string;
  look?: ButtonLook;
  busy?: boolean;
  onConfirm: () => void;
  onClose: () => void;
}

/** Asks once before something that is hard to take back. */
export function ConfirmDialog({
  open,
  title,
  children,
  confirmLabel,
  look,
  busy,
  onConfirm,
  onClose,
}: ConfirmDialogProps) {
  return (
    <Dialog open={open} title={title} onClose={onClose}>
      <div className="mb-4 text-sm">{children}</div>
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Cancel
        </Button>
        <Button look={look ?? 'danger'} busy={busy} onClick={onConfirm}>
          {confirmLabel}
        </Button>
      </div>
    </Dialog>
  );
}

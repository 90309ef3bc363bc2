'use client';

import { createContext, type ReactNode, useCallback, useContext, useMemo, useRef, useState } from 'react';

interface Toast {
  id: number;
  text: string;
  tone: 'plain' | 'broken';
  action?: { label: string; run: () => void };
}

type Say = (text: string, options?: { tone?: Toast['tone']; action?: Toast['action'] }) => void;
const ToastContext = createContext<Say>(() => {});

/** Tells what has just been done, or what failed, without taking the focus. */
export const useToast = () => useContext(ToastContext);

const SHOWN_MS = 8000;

export function ToastProvider({ children }: { children: ReactNode }) {
  const [toasts, setToasts] = useState<readonly Toast[]>([]);
  const next = useRef(1);
  const remove = useCallback((id: number) => setToasts((now) => now.filter((toast) => toast.id !== id)), []);
  const say = useCallback<Say>(
    (text, options) => {
      const id = next.current++;
      setToasts((now) => [
        ...now.slice(-2),
        { id, text, tone: options?.tone ?? 'plain', action: options?.action },
      ]);
      // A failure stays until it is closed: it must not be missed.
      if (options?.tone !== 'broken') setTimeout(() => remove(id), SHOWN_MS);
    },
    [remove],
  );
  const value = useMemo(() => say, [say]);
  return (
    <ToastContext value={value}>
      {children}
      <div className="pointer-events-none fixed inset-x-0 bottom-16 z-50 flex flex-col items-center gap-2 px-4 md:bottom-4">
        <div role="status" className="contents">
          {toasts
            .filter((toast) => toast.tone === 'plain')
            .map((toast) => (
              <ToastCard key={toast.id} toast={toast} onClose={() => remove(toast.id)} />
            ))}
        </div>
        <div role="alert" className="contents">
          {toasts
            .filter((toast) => toast.tone === 'broken')
            .map((toast) => (
              <ToastCard key={toast.id} toast={toast} onClose={() => remove(toast.id)} />
            ))}
        </div>
      </div>
    </ToastContext>
  );
}

function ToastCard({ toast, onClose }: { toast: Toast; onClose: () => void }) {
  return (
    <div
      className={`pointer-events-auto flex max-w-lg items-center gap-3 rounded-md border bg-surface px-3 py-2 text-sm shadow-lg ${
        toast.tone === 'broken' ? 'border-madder! text-madder' : 'border-edge!'
      }`}
    >
      <span>{toast.text}</span>
      {toast.action ? (
        <button
          type="button"
          className="min-h-6 font-semibold text-indigo underline"
          onClick={() => {
            toast.action?.run();
            onClose();
          }}
        >
          {toast.action.label}
        </button>
      ) : null}
      <button type="button" className="min-h-6 min-w-6 rounded" aria-label="Dismiss" onClick={onClose}>
        ✕
      </button>
    </div>
  );
}

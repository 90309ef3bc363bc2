'use client';

import { type KeyboardEvent, useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { CheckboxField } from '@/components/ui/field';
import { type ConnectionAnswer, type OpId, opName, portsOf } from '@/lib/graph';
import { portKey, startConnecting } from '../store/connecting';
import { useEditor, useKernelState } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import { firstFocus } from './first-focus';

interface Target {
  key: string;
  to: OpId;
  port: string;
  text: string;
  answer: ConnectionAnswer;
}

/** Connecting by keys: type to find the operand, arrows choose, Enter connects. Those that refuse say why. */
export function ConnectDialog() {
  const { store, canvas } = useEditor();
  const open = useKernelState((state) => state.dialog === 'connect');
  const from = useKernelState((state) => state.focusedOp);
  const kernel = useKernelState((state) => state.kernel);
  const source = from === null ? undefined : indexOf(kernel).opById.get(from);
  const close = () => {
    store.getState().openDialog(null);
    canvas.current?.focus(from);
  };
  return (
    <Dialog
      open={open && source !== undefined}
      title={source === undefined ? 'Connect' : `Connect ${opName(source)} to`}
      onClose={close}
    >
      {source === undefined ? null : (
        <TargetChoice
          from={source.id}
          onChoose={(target) => {
            close();
            store.getState().connect({ from: source.id, to: target.to, port: target.port });
          }}
          onClose={close}
        />
      )}
    </Dialog>
  );
}

interface TargetChoiceProps {
  from: OpId;
  onChoose: (target: Target) => void;
  onClose: () => void;
}

function TargetChoice({ from, onChoose, onClose }: TargetChoiceProps) {
  const kernel = useKernelState((state) => state.kernel);
  const [query, setQuery] = useState('');
  const [withRefused, setWithRefused] = useState(false);
  const [active, setActive] = useState(0);
  const listId = useId();
  const { answers } = startConnecting(kernel, from, 'click');
  const targets = kernel.ops
    .flatMap((op) =>
      portsOf(op.kind).map((port): Target => {
        const key = portKey(op.id, port.name);
        const answer = answers.get(key) ?? { ok: false, reason: '' };
        return { key, to: op.id, port: port.name, text: `${opName(op)}, ${port.label}`, answer };
      }),
    )
    .filter(({ text, answer }) => (withRefused || answer.ok) && begins(wordsOf(text), wordsOf(query)));
  const current = targets[Math.min(active, targets.length - 1)];
  const choose = (target: Target | undefined) => {
    if (target?.answer.ok) onChoose(target);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowDown') setActive(Math.min(active + 1, targets.length - 1));
    else if (event.key === 'ArrowUp') setActive(Math.max(active - 1, 0));
    else if (event.key === 'Enter') choose(current);
    else return;
    event.preventDefault();
  };
  return (
    <div className="flex flex-col gap-3">
      <input
        type="text"
        role="combobox"
        aria-label="Search operands"
        aria-expanded="true"
        aria-controls={listId}
        aria-activedescendant={current === undefined ? undefined : `${listId}-${current.key}`}
        aria-autocomplete="list"
        ref={firstFocus}
        placeholder="Op or operand"
        className="min-h-8 w-full rounded border border-edge! bg-surface px-2 py-1 text-sm placeholder:text-quiet"
        value={query}
        onChange={(event) => {
          setQuery(event.target.value);
          setActive(0);
        }}
        onKeyDown={onKeyDown}
      />
      <div id={listId} role="listbox" aria-label="Operands" className="max-h-72 overflow-y-auto">
        {targets.map((target) => (
          <TargetOption
            key={target.key}
            id={`${listId}-${target.key}`}
            target={target}
            active={target === current}
            onChoose={() => choose(target)}
          />
        ))}
      </div>
      {targets.length === 0 ? (
        <p className="text-sm text-quiet">
          No operand can take this result. Show those that refuse it to see why.
        </p>
      ) : null}
      <CheckboxField
        label="Show operands that refuse, with the reason"
        checked={withRefused}
        onChange={(event) => setWithRefused(event.target.checked)}
      />
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Cancel
        </Button>
        <Button look="primary" disabled={!current?.answer.ok} onClick={() => choose(current)}>
          Connect
        </Button>
      </div>
    </div>
  );
}

const wordsOf = (text: string): string[] => text.toLowerCase().match(/[\p{L}\p{N}[\]_]+/gu) ?? [];

/** Whether every word that was asked for is the beginning of one in the text: `add b` finds operand b of the op “add”. */
const begins = (words: readonly string[], asked: readonly string[]): boolean =>
  asked.every((part) => words.some((word) => word.startsWith(part)));

function TargetOption(props: { id: string; target: Target; active: boolean; onChoose: () => void }) {
  const { id, target, active, onChoose } = props;
  const note = target.answer.ok
    ? target.answer.needsDistance
      ? 'closes a loop: carried to a later iteration'
      : ''
    : target.answer.reason;
  return (
    <button
      type="button"
      id={id}
      role="option"
      tabIndex={-1}
      aria-selected={active}
      aria-disabled={!target.answer.ok || undefined}
      onClick={onChoose}
      ref={(element) => {
        if (active) element?.scrollIntoView?.({ block: 'nearest' });
      }}
      className={`block w-full rounded px-2 py-1 text-left text-sm ${active ? 'bg-indigo-wash' : ''}`}
    >
      <span className={target.answer.ok ? 'font-semibold' : 'text-quiet'}>{target.text}</span>
      {note ? <span className="block text-quiet">{note}</span> : null}
    </button>
  );
}

'use client';

import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/field';
import { hostsOf } from '@/lib/fabric/unit-library';
import {
  KERNEL_LIMITS,
  type Op,
  opKinds,
  opSpec,
  type ParamSpec,
  paramAccepts,
  paramDomain,
  wordWidthsBits,
} from '@/lib/graph';
import { connectCommand } from '../commands/connect-commands';
import { removeCommand } from '../commands/edit-commands';
import { useRun } from '../commands/use-commands';
import { useEditor, useKernelState } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import { kindEdit, kindsFor, paramEdit } from '../store/op-edits';
import { CommitTextField, IntegerField } from './commit-field';
import { ConsumerList } from './consumer-list';
import { OperandList } from './operand-list';

/** Everything about one op, in fields. */
export function OpInspector({ op }: { op: Op }) {
  const { store } = useEditor();
  const readOnly = useKernelState((state) => state.readOnly);
  const run = useRun();
  const spec = opSpec(op.kind);
  const update = (patch: { label?: string; widthBits?: Op['widthBits'] }, what: string) =>
    store.getState().edit({ type: 'updateOp', id: op.id, patch }, what);
  return (
    <div className="flex flex-col gap-3">
      <p className="text-sm text-quiet">
        {spec.summary}. Runs on:{' '}
        {hostsOf(op.kind)
          .map((unit) => unit.label.toLowerCase())
          .join(', ')}
        .
      </p>
      <CommitTextField
        key={`label-${op.id}`}
        label="Label"
        value={op.label}
        maxLength={KERNEL_LIMITS.labelLength}
        disabled={readOnly}
        onCommit={(text) => {
          update({ label: text.trim() }, 'change label');
          return null;
        }}
      />
      <div className="grid grid-cols-[1fr_6rem] gap-2">
        <KindField op={op} disabled={readOnly} />
        <SelectField
          label="Width"
          disabled={readOnly}
          choices={wordWidthsBits.map((bits) => ({ value: String(bits), label: `${bits} bits` }))}
          value={String(op.widthBits)}
          onChange={(event) => {
            const widthBits = wordWidthsBits.find((bits) => String(bits) === event.target.value);
            if (widthBits !== undefined) update({ widthBits }, 'change width');
          }}
        />
      </div>
      {spec.params.map((param) => (
        <ParamField key={`${op.id}-${param.name}`} op={op} param={param} disabled={readOnly} />
      ))}
      <OperandList op={op} />
      <ConsumerList op={op} />
      {readOnly ? null : (
        <div className="flex flex-wrap gap-2">
          {spec.output === null ? null : (
            <Button
              onClick={() => {
                store.getState().focusOp(op.id);
                run(connectCommand);
              }}
            >
              Connect result…
            </Button>
          )}
          <Button look="danger" onClick={() => run(removeCommand)}>
            Delete op
          </Button>
        </div>
      )}
    </div>
  );
}

function KindField({ op, disabled }: { op: Op; disabled: boolean }) {
  const { store } = useEditor();
  const kernel = useKernelState((state) => state.kernel);
  const index = indexOf(kernel);
  const fits = kindsFor(op, index.edgesInto.get(op.id) ?? [], index.edgesOutOf.get(op.id) ?? []);
  const choices = opKinds
    .filter((kind) => kind === op.kind || fits(kind))
    .map((kind) => ({ value: kind, label: opSpec(kind).label }));
  return (
    <SelectField
      label="Operation"
      disabled={disabled}
      choices={choices}
      value={op.kind}
      onChange={(event) => {
        const kind = opKinds.find((candidate) => candidate === event.target.value);
        if (kind !== undefined) store.getState().edit(kindEdit(op, kind), 'change operation');
      }}
    />
  );
}

function ParamField({ op, param, disabled }: { op: Op; param: ParamSpec; disabled: boolean }) {
  const { store } = useEditor();
  const value = op.params[param.name];
  const change = (next: string | number) =>
    store.getState().edit(paramEdit(op, param.name, next), `change ${param.label.toLowerCase()}`);
  switch (param.type) {
    case 'integer':
      return (
        <IntegerField
          label={param.label}
          value={typeof value === 'number' ? value : null}
          min={param.min}
          max={param.max}
          disabled={disabled}
          onCommit={(next) => {
            if (next !== null) change(next);
          }}
        />
      );
    case 'choice':
      return (
        <SelectField
          label={param.label}
          disabled={disabled}
          choices={param.choices.map((choice) => ({ value: choice, label: choice }))}
          value={String(value ?? '')}
          onChange={(event) => change(event.target.value)}
        />
      );
    case 'dataName':
      return (
        <CommitTextField
          label={param.label}
          value={String(value ?? '')}
          disabled={disabled}
          onCommit={(text) => {
            const named = /^[A-Za-z_][A-Za-z0-9_]{0,39}$/.test(text) && paramAccepts(param, text);
            if (named) change(text);
            return named ? null : `Give ${paramDomain(param)}.`;
          }}
        />
      );
  }
}

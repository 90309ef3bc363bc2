'use client';

import type { ComponentProps } from 'react';
import { Button } from '@/components/ui/button';
import { CheckboxField, SelectField, TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { type Topology, topologies } from '@/lib/fabric/fabric';
import { unitMixPatterns } from '@/lib/fabric/presets';
import { HopLimit } from '../fabric-view/hop-limit';
import { topologyLabels } from '../fabric-view/topology-labels';
import { FabricPreview } from './fabric-preview';
import { type CreateFabric, type FabricFormState, useFabricForm } from './form-state';
import { type FabricFormField, type FabricFormValues, firstFormValues } from './form-values';

interface FabricFormProps {
  create: CreateFabric;
  onCreated: (fabricId: string) => void;
  initial?: FabricFormValues;
}

/** A new fabric: its numbers on one side, what they make on the other, redrawn at every change. */
export function FabricForm({ create, onCreated, initial = firstFormValues }: FabricFormProps) {
  const state = useFabricForm(initial, create, onCreated);
  return (
    <div className="grid gap-6 lg:grid-cols-[minmax(20rem,26rem)_1fr]">
      <form ref={state.form} onSubmit={state.submit} noValidate className="space-y-6" aria-label="New fabric">
        <Shape state={state} />
        <Wires state={state} />
        <Clock state={state} />
        {state.failure ? (
          <Notice tone="broken" live>
            {state.failure}
          </Notice>
        ) : null}
        <Button type="submit" look="primary" busy={state.busy}>
          Create fabric
        </Button>
      </form>
      <FabricPreview values={state.values} />
    </div>
  );
}

function Group({ title, children }: { title: string; children: ComponentProps<'fieldset'>['children'] }) {
  return (
    <fieldset className="space-y-3">
      <legend className="text-xs font-semibold tracking-widest text-quiet uppercase">{title}</legend>
      {children}
    </fieldset>
  );
}

type TextFieldName = Exclude<FabricFormField, 'clocked' | 'topology' | 'mix'>;

/** One text field of the form; numbers are typed as text, so that nothing typed is ever lost. */
function Entry({
  state,
  field,
  ...rest
}: { state: FabricFormState; field: TextFieldName } & ComponentProps<typeof TextField>) {
  return (
    <TextField
      name={field}
      value={state.values[field]}
      error={state.errorOf(field)}
      autoComplete="off"
      onChange={(event) => state.set(field, event.target.value)}
      // On the way to the button, a new error line would push the button from under the pointer.
      onBlur={(event) => {
        if (!isSubmit(event.relatedTarget)) state.leave(field);
      }}
      {...rest}
    />
  );
}

function Shape({ state }: { state: FabricFormState }) {
  const mix = unitMixPatterns.find((pattern) => pattern.id === state.values.mix);
  return (
    <Group title="Grid">
      <Entry state={state} field="name" label="Name" maxLength={200} />
      <div className="grid grid-cols-2 gap-3">
        <Entry state={state} field="rows" label="Rows" inputMode="numeric" />
        <Entry state={state} field="cols" label="Columns" inputMode="numeric" />
      </div>
      <SelectField
        name="topology"
        label="Topology"
        choices={topologies.map((value) => ({ value, label: topologyLabels[value] }))}
        value={state.values.topology}
        error={state.errorOf('topology')}
        onChange={(event) => state.set('topology', event.target.value as Topology)}
      />
      <SelectField
        name="mix"
        label="Unit mix"
        choices={unitMixPatterns.map((pattern) => ({ value: pattern.id, label: pattern.label }))}
        value={state.values.mix}
        error={state.errorOf('mix')}
        hint={mix?.description}
        onChange={(event) => state.set('mix', event.target.value)}
      />
    </Group>
  );
}

function Wires({ state }: { state: FabricFormState }) {
  return (
    <Group title="Links and memory">
      <div className="grid grid-cols-3 items-end gap-3">
        <Entry state={state} field="channels" label="Channels per link" inputMode="numeric" />
        <Entry state={state} field="bufferDepth" label="Buffer depth" inputMode="numeric" />
        <Entry state={state} field="memoryBanks" label="Memory banks" inputMode="numeric" />
      </div>
    </Group>
  );
}

function Clock({ state }: { state: FabricFormState }) {
  return (
    <Group title="Clock">
      <CheckboxField
        name="clocked"
        label="Limit paths by the clock"
        hint="A value crosses any number of routers within one cycle, as far as the period reaches."
        checked={state.values.clocked}
        onChange={(event) => state.set('clocked', event.target.checked)}
      />
      {state.values.clocked ? (
        <div className="grid grid-cols-3 items-end gap-3">
          <Entry state={state} field="periodPs" label="Period (ps)" inputMode="decimal" />
          <Entry state={state} field="entryDelayPs" label="Entry delay (ps)" inputMode="decimal" />
          <Entry state={state} field="hopDelayPs" label="Hop delay (ps)" inputMode="decimal" />
        </div>
      ) : null}
      <HopLimit clock={state.clock} />
    </Group>
  );
}

const isSubmit = (target: EventTarget | null): boolean =>
  target instanceof HTMLButtonElement && target.type === 'submit';

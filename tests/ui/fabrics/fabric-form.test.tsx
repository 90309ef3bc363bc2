import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { FabricForm } from '@/components/fabric-form/fabric-form';
import { fabricOfForm } from '@/components/fabric-form/fabric-of-form';
import type { CreateFabric } from '@/components/fabric-form/form-state';
import { fabricFormSchema, firstFormValues, parseFabricForm } from '@/components/fabric-form/form-values';
import { fabricSchema } from '@/lib/fabric/fabric';
import { err, ok } from '@/lib/result';

const created: CreateFabric = async () => ok({ fabricId: 'fabric_1' });

function show(create: CreateFabric = created) {
  const onCreated = vi.fn();
  const spied = vi.fn(create);
  render(<FabricForm create={spied} onCreated={onCreated} />);
  return { user: userEvent.setup(), create: spied, onCreated };
}
const field = (name: string) => screen.getByRole('textbox', { name });
const send = () => screen.getByRole('button', { name: 'Create fabric' });
const figure = (name: string) => {
  const term = within(screen.getByRole('region', { name: 'Preview' })).getByText(name);
  return term.nextElementSibling?.textContent;
};

describe('the new-fabric form', () => {
  it('sends texts as typed and passes the id of the new fabric on', async () => {
    const { user, create, onCreated } = show();
    await user.type(field('Name'), 'Stream gauge');
    await user.clear(field('Rows'));
    await user.type(field('Rows'), '4');
    await user.selectOptions(screen.getByRole('combobox', { name: 'Topology' }), 'torus');
    await user.click(send());
    expect(create).toHaveBeenCalledWith({
      name: 'Stream gauge',
      rows: '4',
      cols: '6',
      topology: 'torus',
      mix: 'memoryEdges',
      channels: '1',
      bufferDepth: '4',
      memoryBanks: '4',
      clock: null,
    });
    expect(onCreated).toHaveBeenCalledWith('fabric_1');
  });

  it('marks the field that is wrong, focuses the first one and sends nothing', async () => {
    const { user, create } = show();
    await user.clear(field('Rows'));
    await user.type(field('Rows'), '65');
    await user.click(send());
    expect(create).not.toHaveBeenCalled();
    expect(field('Name')).toHaveFocus();
    expect(field('Name')).toHaveAccessibleDescription('Give the fabric a name.');
    expect(field('Rows')).toHaveAccessibleDescription('Enter a whole number from 1 to 64.');
    expect(field('Columns')).not.toHaveAttribute('aria-invalid');
  });

  it('complains about a field once it is left, not while it is typed in', async () => {
    const { user } = show();
    await user.clear(field('Channels per link'));
    await user.type(field('Channels per link'), '0');
    expect(field('Channels per link')).not.toHaveAttribute('aria-invalid');
    await user.tab();
    expect(field('Channels per link')).toHaveAccessibleDescription('Enter a whole number from 1 to 16.');
  });

  it('keeps everything when the server refuses, and puts its words at the field', async () => {
    const refusal = err({ message: 'Another name, please.', fields: { 'form.name': 'This name is taken.' } });
    const { user, onCreated } = show(async () => refusal);
    await user.type(field('Name'), 'Hive');
    await user.click(send());
    expect(await screen.findByText('Another name, please.')).toBeInTheDocument();
    expect(field('Name')).toHaveValue('Hive');
    expect(field('Name')).toHaveAccessibleDescription('This name is taken.');
    expect(field('Name')).toHaveFocus();
    expect(onCreated).not.toHaveBeenCalled();
    await user.type(field('Name'), ' 2');
    expect(field('Name')).not.toHaveAttribute('aria-invalid');
  });

  it('keeps everything when the server cannot be reached', async () => {
    const { user } = show(() => Promise.reject(new Error('offline')));
    await user.type(field('Name'), 'Hive');
    await user.click(send());
    expect(await screen.findByText(/could not be reached/)).toBeInTheDocument();
    expect(field('Name')).toHaveValue('Hive');
    expect(send()).toBeEnabled();
  });

  it('works out the longest path while the times are typed: floor((5,000 − 400) / 700) = 6', async () => {
    const { user } = show();
    await user.click(screen.getByRole('checkbox', { name: 'Limit paths by the clock' }));
    expect(screen.getAllByText('floor((5,000 − 400) / 600) = 7')[0]).toBeInTheDocument();
    await user.clear(field('Hop delay (ps)'));
    expect(screen.getByText('Enter all three times to see the longest path.')).toBeInTheDocument();
    await user.type(field('Hop delay (ps)'), '700');
    expect(screen.getAllByText('floor((5,000 − 400) / 700) = 6')[0]).toBeInTheDocument();
  });

  it('keeps the times while the clock is switched off, and does not ask for them then', async () => {
    const { user, create } = show();
    const clock = screen.getByRole('checkbox', { name: 'Limit paths by the clock' });
    await user.type(field('Name'), 'Hive');
    await user.click(clock);
    await user.type(field('Period (ps)'), 'x');
    await user.click(clock);
    await user.click(send());
    expect(create).toHaveBeenCalledTimes(1);
    await user.click(clock);
    expect(field('Period (ps)')).toHaveValue('5000x');
  });

  it('counts live: a 6 × 6 mesh has 2 · 2 · 6 · 5 = 120 directed links, a 6 × 2 mesh 2 · (6 · 1 + 5 · 2) = 32', async () => {
    const { user } = show();
    expect(figure('Directed links')).toBe('120');
    expect(figure('Diameter')).toBe('10 hops');
    await user.clear(field('Columns'));
    expect(figure('Directed links')).toBe('120');
    expect(screen.getByText(/last valid values/)).toBeInTheDocument();
    await user.type(field('Columns'), '2');
    expect(figure('Directed links')).toBe('32');
    expect(figure('Diameter')).toBe('6 hops');
  });
});

describe('the form’s schema', () => {
  const wrong: [string, Partial<typeof firstFormValues>, string][] = [
    ['a fraction of a row', { rows: '2.5' }, 'rows'],
    ['a negative number', { cols: '-3' }, 'cols'],
    ['a number in words', { channels: 'two' }, 'channels'],
    ['an exponent', { bufferDepth: '1e3' }, 'bufferDepth'],
    ['more banks than 1024', { memoryBanks: '1025' }, 'memoryBanks'],
    ['a name of spaces', { name: '   ' }, 'name'],
    ['a name of 81 letters', { name: 'n'.repeat(81) }, 'name'],
    ['an unknown mix', { mix: 'plaid' }, 'mix'],
    ['a period of nothing', { clocked: true, periodPs: '0' }, 'periodPs'],
    ['a hop without delay', { clocked: true, hopDelayPs: '0' }, 'hopDelayPs'],
    ['a time below zero', { clocked: true, entryDelayPs: '-1' }, 'entryDelayPs'],
  ];
  it.each(wrong)('refuses %s at its own field', (_, change, at) => {
    const outcome = parseFabricForm({ ...firstFormValues, name: 'Hive', ...change });
    expect(outcome.ok).toBe(false);
    expect(Object.keys(outcome.ok ? {} : outcome.errors)).toEqual([at]);
  });

  it('makes a document that the fabric schema takes', () => {
    const outcome = parseFabricForm({ ...firstFormValues, name: ' Hive ', clocked: true, entryDelayPs: '0' });
    if (!outcome.ok) throw new Error('the form was refused');
    const document = fabricOfForm(outcome.form);
    expect(fabricSchema.parse(document)).toEqual(document);
    expect(document).toMatchObject({ name: 'Hive', rows: 6, clock: { periodPs: 5000, entryDelayPs: 0 } });
  });

  it('refuses fields that it does not know', () => {
    expect(fabricFormSchema.safeParse({ ...firstFormValues, name: 'Hive', clock: null }).success).toBe(false);
  });
});

/** What the new-fabric form holds, as typed, and its one parser: the form and the server ask the same one. */
import { z } from 'zod';
import { FABRIC_LIMITS, type Topology, topologies } from '@/lib/fabric/fabric';
import { unitMixPatterns } from '@/lib/fabric/presets';

const BANKS_MAX = 1024;
const TIME_MAX_PS = 1e9;

/** A whole number typed into a field; the message names the range, so that it says what to do. */
const wholeNumber = (max: number) => {
  const message = `Enter a whole number from 1 to ${max.toLocaleString('en-GB')}.`;
  return z
    .string()
    .trim()
    .regex(/^\d{1,9}$/, message)
    .transform(Number)
    .pipe(z.number().min(1, message).max(max, message));
};

const duration = (above: 'above zero' | 'zero or more') => {
  const message =
    above === 'above zero'
      ? 'Enter a time above 0 ps, such as 180 or 62.5.'
      : 'Enter a time of 0 ps or more, such as 180 or 62.5.';
  const least = above === 'above zero' ? z.number().positive(message) : z.number().min(0, message);
  return z
    .string()
    .trim()
    .regex(/^\d{1,10}(\.\d{1,6})?$/, message)
    .transform(Number)
    .pipe(least.max(TIME_MAX_PS, 'Enter at most 1,000,000,000 ps.'));
};

const clockSchema = z.strictObject({
  periodPs: duration('above zero'),
  entryDelayPs: duration('zero or more'),
  hopDelayPs: duration('above zero'),
});

export const fabricFormSchema = z.strictObject({
  name: z
    .string()
    .trim()
    .min(1, 'Give the fabric a name.')
    .max(FABRIC_LIMITS.nameLength, `Use at most ${FABRIC_LIMITS.nameLength} characters.`),
  rows: wholeNumber(FABRIC_LIMITS.side),
  cols: wholeNumber(FABRIC_LIMITS.side),
  topology: z.enum(topologies, 'Choose one of the topologies.'),
  mix: z.string().refine((id) => unitMixPatterns.some((pattern) => pattern.id === id), 'Choose a unit mix.'),
  channels: wholeNumber(FABRIC_LIMITS.channels),
  bufferDepth: wholeNumber(FABRIC_LIMITS.bufferDepth),
  memoryBanks: wholeNumber(BANKS_MAX),
  /** Null: paths have no limit. */
  clock: clockSchema.nullable(),
});

/** What is sent to the server: texts as typed. */
export type FabricFormInput = z.input<typeof fabricFormSchema>;
/** The same, parsed to numbers. */
export type ParsedFabricForm = z.output<typeof fabricFormSchema>;

/** The fields on the screen. The times stay even while the clock is switched off. */
export interface FabricFormValues {
  name: string;
  rows: string;
  cols: string;
  topology: Topology;
  mix: string;
  channels: string;
  bufferDepth: string;
  memoryBanks: string;
  clocked: boolean;
  periodPs: string;
  entryDelayPs: string;
  hopDelayPs: string;
}
export type FabricFormField = keyof FabricFormValues;
export type FabricFormErrors = Partial<Record<FabricFormField, string>>;

/** In the order of the screen: the first wrong one gets the focus. */
export const fabricFormFields: readonly FabricFormField[] = [
  'name',
  'rows',
  'cols',
  'topology',
  'mix',
  'channels',
  'bufferDepth',
  'memoryBanks',
  'clocked',
  'periodPs',
  'entryDelayPs',
  'hopDelayPs',
];

export function fabricFormInput(values: FabricFormValues): FabricFormInput {
  const { clocked, periodPs, entryDelayPs, hopDelayPs, ...rest } = values;
  return { ...rest, clock: clocked ? { periodPs, entryDelayPs, hopDelayPs } : null };
}

/** Errors by field from dotted paths such as `form.clock.periodPs`; paths of no field are left out. */
export function errorsByField(fields: Readonly<Record<string, string>>): FabricFormErrors {
  const errors: FabricFormErrors = {};
  for (const [path, message] of Object.entries(fields)) {
    const field = fabricFormFields.find((name) => name === path.split('.').at(-1));
    if (field) errors[field] ??= message;
  }
  return errors;
}

export const firstFormValues: FabricFormValues = {
  name: '',
  rows: '6',
  cols: '6',
  topology: 'mesh',
  mix: unitMixPatterns[0]?.id ?? '',
  channels: '1',
  bufferDepth: '4',
  memoryBanks: '4',
  clocked: false,
  periodPs: '5000',
  entryDelayPs: '400',
  hopDelayPs: '600',
};

/** The clock as numbers, or null while one of its times is not valid. */
export function clockOf(values: FabricFormValues): ParsedFabricForm['clock'] {
  const { periodPs, entryDelayPs, hopDelayPs } = values;
  return clockSchema.safeParse({ periodPs, entryDelayPs, hopDelayPs }).data ?? null;
}

export type FabricFormOutcome =
  | { ok: true; form: ParsedFabricForm }
  | { ok: false; errors: FabricFormErrors };

export function parseFabricForm(values: FabricFormValues): FabricFormOutcome {
  const parsed = fabricFormSchema.safeParse(fabricFormInput(values));
  if (parsed.success) return { ok: true, form: parsed.data };
  const fields: Record<string, string> = {};
  for (const issue of parsed.error.issues) fields[issue.path.join('.')] ??= issue.message;
  return { ok: false, errors: errorsByField(fields) };
}

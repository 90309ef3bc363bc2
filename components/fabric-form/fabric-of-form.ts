import type { Fabric } from '@/lib/fabric/fabric';
import { newFabric, unitMixPattern } from '@/lib/fabric/presets';
import type { ParsedFabricForm } from './form-values';

/** The document that a parsed form stands for. Throws on an unknown mix, which the form's schema refuses. */
export function fabricOfForm(form: ParsedFabricForm): Fabric {
  const mix = unitMixPattern(form.mix);
  if (!mix) throw new RangeError(`No unit mix is called "${form.mix}"`);
  return newFabric({ ...form, mix });
}

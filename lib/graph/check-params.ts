/** Rules of an op's parameters. */
import type { Op } from './kernel';
import { opSpec, type ParamSpec } from './op-catalog';
import { opName } from './ports';
import { errorProblem, type Problem } from './problem';

/** K8. */
export function checkParams(op: Op): Problem[] {
  const { params } = opSpec(op.kind);
  const known = new Set(params.map((param) => param.name));
  const places = { opIds: [op.id] };
  const surplus = Object.keys(op.params)
    .filter((name) => !known.has(name))
    .map((name) =>
      errorProblem('unknownParam', `${opName(op)} has no parameter “${name}”: remove it.`, places),
    );
  const faulty = params.flatMap((param) => {
    if (!Object.hasOwn(op.params, param.name)) {
      const text = `${opName(op)} lacks its parameter “${param.label}”: give ${paramDomain(param)}.`;
      return [errorProblem('missingParam', text, places)];
    }
    const value = op.params[param.name];
    if (value !== undefined && paramAccepts(param, value)) return [];
    const text = `“${param.label}” of ${opName(op)} is ${String(value)}: give ${paramDomain(param)}.`;
    return [errorProblem('paramValue', text, places)];
  });
  return [...surplus, ...faulty];
}

export function paramAccepts(param: ParamSpec, value: string | number): boolean {
  switch (param.type) {
    case 'integer':
      return typeof value === 'number' && value >= param.min && value <= param.max;
    case 'dataName':
      return typeof value === 'string';
    case 'choice':
      return typeof value === 'string' && param.choices.includes(value);
  }
}

/** What a parameter may be, as the end of a sentence. */
export function paramDomain(param: ParamSpec): string {
  switch (param.type) {
    case 'integer':
      return `an integer from ${param.min} to ${param.max}`;
    case 'dataName':
      return 'a name of up to 40 letters, digits or underscores';
    case 'choice':
      return param.choices.join(' or ');
  }
}

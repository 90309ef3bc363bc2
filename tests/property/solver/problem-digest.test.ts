import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { UnitSpec } from '@/lib/fabric/unit-library';
import { weightsSchema } from '@/lib/mapping/weights';
import type { PlacementProblem } from '@/lib/solver/problem';
import { canonicalText, problemDigest } from '@/lib/solver/problem-digest';
import { tinyCaseArb } from './tiny-cases';

const SEED = 20260411;

/** The same value with the members of every object in another order. */
function turned<T>(value: T): T {
  if (Array.isArray(value)) return value.map(turned) as T;
  if (typeof value !== 'object' || value === null) return value;
  const members = Object.entries(value).map(([name, member]) => [name, turned(member)] as const);
  return Object.fromEntries(members.reverse()) as T;
}

type Json = string | number | boolean | null | Json[] | { [name: string]: Json };

/** Every leaf of a document, as a function that makes a copy with that leaf changed. */
function changes(value: Json, at = ''): { at: string; changed: Json }[] {
  if (Array.isArray(value)) {
    const added = { at: `${at}[+]`, changed: [...value, value[0] ?? 'more'] };
    const inner = value.flatMap((item, i) =>
      changes(item, `${at}[]`).map((one) => ({ at: one.at, changed: value.with(i, one.changed) })),
    );
    return [added, ...inner];
  }
  if (typeof value === 'object' && value !== null) {
    return Object.entries(value).flatMap(([name, member]) =>
      changes(member, `${at}.${name}`).map((one) => ({
        at: one.at,
        changed: { ...value, [name]: one.changed },
      })),
    );
  }
  if (typeof value === 'number') return [{ at, changed: value + 1 }];
  if (typeof value === 'boolean') return [{ at, changed: !value }];
  return [{ at, changed: value === null ? 'something' : `${value}x` }];
}

/** What only people read: changing it makes no other problem. */
const forPeople = [
  '.kernel.name',
  '.kernel.description',
  '.kernel.ops[].label',
  '.kernel.ops[].positionPx.x',
  '.kernel.ops[].positionPx.y',
  '.fabric.name',
  '.fabric.description',
];

describe("a problem's digest", () => {
  it('is another one with weights that count in the objective, and the same with others', () => {
    fc.assert(
      fc.property(tinyCaseArb, (tiny) => {
        const { kernel, objective } = tiny;
        const digestWith = (weights: object) =>
          problemDigest({ ...tiny, weights: weightsSchema.parse(weights) });
        const [net, edge] = [kernel.edges[0]?.from ?? '', kernel.edges[0]?.id ?? ''];
        const counting = (weight: number) =>
          objective === 'wire' ? { nets: { [net]: weight } } : { edges: { [edge]: weight } };
        const idle = objective === 'wire' ? { edges: { [edge]: 2 } } : { nets: { [net]: 2 } };
        expect(new Set([2, 3, 0].map((weight) => digestWith(counting(weight)))).size).toBe(3);
        expect(digestWith(counting(2))).not.toBe(problemDigest(tiny));
        for (const same of [{}, idle, counting(1)]) expect(digestWith(same)).toBe(problemDigest(tiny));
      }),
      { seed: SEED, numRuns: 30 },
    );
  });

  it('is the same whatever the order of members', () => {
    fc.assert(
      fc.property(tinyCaseArb, (tiny) => {
        const other = turned(tiny);
        expect(JSON.stringify(other)).not.toBe(JSON.stringify(tiny));
        expect(problemDigest(other)).toBe(problemDigest(tiny));
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('changes with every single field that is not for people only, and with no other', () => {
    fc.assert(
      fc.property(tinyCaseArb, (tiny) => {
        const digest = problemDigest(tiny);
        const unchanged = new Set<string>();
        for (const { at, changed } of changes(JSON.parse(JSON.stringify(tiny)))) {
          if (problemDigest(changed as unknown as PlacementProblem) === digest) unchanged.add(at);
        }
        expect([...unchanged].sort()).toEqual([...forPeople].sort());
      }),
      { seed: SEED, numRuns: 60 },
    );
  });

  it('is of a text that is JSON of the same value, and always the same text', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        const text = canonicalText(value);
        expect(canonicalText(turned(value))).toBe(text);
        expect(JSON.parse(text)).toEqual(JSON.parse(JSON.stringify(value)));
      }),
      { seed: SEED, numRuns: 300 },
    );
  });

  it("does not depend on the start, but on what a workspace's own units can do of the kernel", () => {
    fc.assert(
      fc.property(tinyCaseArb, (tiny) => {
        const op = tiny.kernel.ops[0]!;
        const start = { [op.id]: 'r0c0' } as PlacementProblem['start'];
        const own = (kind: string): UnitSpec =>
          ({ id: 'unit_own', operations: { [kind]: {} } }) as unknown as UnitSpec;
        const fabric = { ...tiny.fabric, units: ['unit_own', ...tiny.fabric.units.slice(1)] };
        const withUnit = (kind: string) =>
          problemDigest({ ...tiny, fabric, units: [own(kind)] } as unknown as PlacementProblem);
        expect(problemDigest({ ...tiny, start })).toBe(problemDigest(tiny));
        expect(withUnit(op.kind)).not.toBe(withUnit('scratchRead'));
      }),
      { seed: SEED, numRuns: 50 },
    );
  });
});

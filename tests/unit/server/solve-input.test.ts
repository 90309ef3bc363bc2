import { describe, expect, it } from 'vitest';
import { solveInput } from '@/app/w/[workspace]/mappings/solve-input';
import { newId } from '@/db/ids';

const plain = { engine: 'auto', objective: 'wire', timeLimitMs: 1000, seed: 1 };
const accepts = (ask: unknown): boolean =>
  solveInput.safeParse({
    workspace: 'tarnbrook',
    draftId: newId('draft'),
    settings: ask === undefined ? plain : { ...plain, ask },
    pins: {},
    startPlacement: null,
  }).success;
const placement = { op_raw: 'r0c0' };
const another = { kind: 'another', objectiveValue: 4, than: [placement] };
const pinPrice = { kind: 'pin price', op: 'op_raw', tile: 'r0c0', side: 'without pin' };

describe('a request for a solve', () => {
  it.each([
    ['no question', undefined],
    ['another', another],
    ['another than fifty', { ...another, than: Array.from({ length: 50 }, () => placement) }],
    ['the price of a pin', pinPrice],
  ])('takes %s', (_, ask) => expect(accepts(ask)).toBe(true));

  it.each([
    ['more than fifty', { ...another, than: Array.from({ length: 51 }, () => placement) }],
    ['a cost below 0', { ...another, objectiveValue: -1 }],
    ['a cost without end', { ...another, objectiveValue: Number.POSITIVE_INFINITY }],
    ['a placement on no tile', { ...another, than: [{ op_raw: 'somewhere' }] }],
    ['a side that there is not', { ...pinPrice, side: 'both' }],
    ['an op that is no id', { ...pinPrice, op: 'raw op' }],
    ['what is known already: that is the server’s to say', { ...another, provenBound: 4 }],
    ['another question', { kind: 'best' }],
    ['no question at all, named', null],
  ])('refuses %s', (_, ask) => expect(accepts(ask)).toBe(false));
});

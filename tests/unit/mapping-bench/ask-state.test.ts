import { describe, expect, test } from 'vitest';
import {
  avoidedPlacements,
  furtherAsk,
  priceAnswer,
  priceSentence,
  speaksOf,
} from '@/components/mapping-bench/solve/ask-state';
import { anotherSentence, type Solve, solveSchema } from '@/components/mapping-bench/solve/solve-state';
import type { TileId } from '@/lib/fabric/fabric';
import type { Placement } from '@/lib/mapping/mapping';
import { ids, tile } from './bench-fixture';

const outcome = (status: string, objectiveValue: number | null, bound: number | null) => ({
  status,
  engine: 'search + exact',
  elapsedMs: 100,
  objectiveValue,
  bound,
  gapRatio: null,
  stopReason: null,
  reason: null,
  explanation: null,
});
const answer = (status: string, objectiveValue: number | null, bound: number | null) => ({
  status,
  objective: 'wire',
  objectiveValue,
  bound,
  solveId: null,
});
const solveOf = (ask: object, over: object = {}): Solve =>
  solveSchema.parse({
    id: 'solve_1',
    state: 'done',
    settings: { engine: 'auto', objective: 'wire', timeLimitMs: 1000, seed: 1, ask },
    pins: {},
    cancelRequested: false,
    phase: 'exact',
    bestObjective: null,
    bound: null,
    gapRatio: null,
    elapsedMs: 100,
    nodes: 0,
    best: null,
    history: [],
    outcome: null,
    ...over,
  });
const priceOf = (
  own: object | null,
  other: object,
  side: 'with pin' | 'without pin' = 'without pin',
  over: object = {},
): Solve =>
  solveOf(
    { kind: 'pin price', op: ids.left, tile: tile(0), side, isPinned: true, other },
    { outcome: own, ...over },
  );
const sentence = (solve: Solve): string => {
  const told = priceAnswer(solve);
  return told ? priceSentence(told) : '';
};

describe('the price of a pin in words', () => {
  test.each([
    [
      priceOf(outcome('optimal', 38, 38), answer('optimal', 41, 41)),
      'Without this pin: 38 wire hops, proved. With it: 41 wire hops, proved. The pin costs 3.',
    ],
    [
      priceOf(outcome('optimal', 38, 38), answer('optimal', 38, 38)),
      'Without this pin: 38 wire hops, proved. With it: 38 wire hops, proved. The pin costs nothing.',
    ],
    [
      priceOf(outcome('optimal', 38, 38), answer('feasible', 41, 39.2)),
      'Without this pin: 38 wire hops, proved. With it: 41 wire hops found, at least 40. The pin costs from 2 to 3.',
    ],
    [
      priceOf(outcome('feasible', 38, 36), answer('feasible', 38, 30)),
      'Without this pin: 38 wire hops found, at least 36. With it: 38 wire hops found, at least 30. The pin costs at most 2.',
    ],
    [
      priceOf(outcome('infeasible', null, null), answer('optimal', 38, 38), 'with pin'),
      'Without this pin: 38 wire hops, proved. With it: no legal mapping. The pin leaves no legal mapping.',
    ],
    [
      priceOf(outcome('optimal', 38, 38), answer('unknown', null, 0)),
      'Without this pin: 38 wire hops, proved. With it: none found. What the pin costs is not known yet; a longer time may tell.',
    ],
  ])('%#', (solve, words) => expect(sentence(solve)).toBe(words));

  test('where the bench has no such pin it speaks of what would be', () => {
    const ask = { kind: 'pin price', op: ids.left, tile: tile(0), side: 'with pin', isPinned: false };
    const other = answer('optimal', 38, 38);
    expect(sentence(solveOf({ ...ask, other }, { outcome: outcome('optimal', 41, 41) }))).toBe(
      'Pinned here: 41 wire hops, proved. Not pinned: 38 wire hops, proved. The pin would cost 3.',
    );
  });
});

describe('the other side is solved next', () => {
  const found = outcome('optimal', 38, 38);
  test('where it is not settled and would tell more', () => {
    expect(furtherAsk(priceOf(found, answer('feasible', 41, 30)))).toEqual({
      kind: 'pin price',
      op: ids.left,
      tile: tile(0),
      side: 'with pin',
    });
    expect(furtherAsk(priceOf(found, answer('unknown', null, 0)))).not.toBeNull();
  });

  test.each([
    [
      'not while this one runs',
      priceOf(null, answer('feasible', 41, 30), 'without pin', { state: 'running' }),
    ],
    ['not where it is proved', priceOf(outcome('feasible', 38, 30), answer('optimal', 41, 41))],
    ['not where it has no mapping', priceOf(outcome('unknown', null, 9), answer('infeasible', null, null))],
    ['not where the price is exact without it', priceOf(found, answer('feasible', 38, 30))],
  ])('%s', (_, solve) => expect(furtherAsk(solve)).toBeNull());
});

test('an answer speaks of the bench as long as no pin is changed', () => {
  const pins = { [ids.left]: tile(0), [ids.out]: tile(2) };
  const solve = priceOf(null, answer('unknown', null, 0), 'without pin', { pins: { [ids.out]: tile(2) } });
  expect(speaksOf(pins, solve)).toBe(true);
  expect(speaksOf({ [ids.out]: tile(2) }, solve)).toBe(false);
  expect(speaksOf({ ...pins, [ids.left]: tile(3) }, solve)).toBe(false);
  expect(speaksOf({ ...pins, [ids.sum]: tile(1) }, solve)).toBe(false);
  expect(speaksOf({ ...pins, [ids.out]: tile(6) }, solve)).toBe(false);
});

describe('placements to avoid', () => {
  const at = (index: number): Placement => ({ [ids.left]: `r0c${index}` as TileId, [ids.out]: tile(8) });
  test('are whole ones, each once, in whatever order of keys', () => {
    const reversed = Object.fromEntries(Object.entries(at(1)).reverse()) as Placement;
    expect(avoidedPlacements([at(0), {}, at(1), reversed], 2)).toEqual([at(0), at(1)]);
  });

  test('are the last fifty', () => {
    const shown = Array.from({ length: 60 }, (_, i) => at(i));
    expect(avoidedPlacements(shown, 2)).toEqual(shown.slice(10));
  });

  test('have room in a request: of 2,000 ops some three', () => {
    const large = (shift: number) =>
      Object.fromEntries(
        Array.from({ length: 2000 }, (_, i) => [`op_${'x'.repeat(20)}${i}`, `r${i}c${shift}`]),
      ) as Placement;
    const avoided = avoidedPlacements([1, 2, 3, 4, 5, 6].map(large), 2000);
    expect(avoided.length).toBeGreaterThan(1);
    expect(JSON.stringify(avoided).length).toBeLessThan(350_000);
    expect(avoided.at(-1)).toEqual(large(6));
    const repeated = [large(1), ...Array.from({ length: 9 }, () => large(2))];
    expect(avoidedPlacements(repeated, 2000)).toEqual([large(1), large(2)]);
  });
});

describe('another mapping in words', () => {
  const ask = { kind: 'another', objectiveValue: 38 };
  const none = { ...outcome('infeasible', null, null), reason: 'Why.' };
  const explained = (code: string) => ({
    outcome: { ...none, explanation: { code, opIds: [], tileIds: [] } },
  });
  test.each([
    ['There is no other, besides mirror images.', explained('no other')],
    ['Why.', explained('pin conflict')],
    ['No other was found.', { outcome: { ...outcome('unknown', null, 30), reason: 'No other was found.' } }],
    ['It was stopped before another one was found; there may be one.', { state: 'cancelled' }],
    [
      'Another mapping of 37 wire hops was found; it is offered beside the fabric.',
      { best: { objectiveValue: 37, placement: {}, routes: {} }, outcome: outcome('feasible', 37, 30) },
    ],
  ])('%s', (words, over) => expect(anotherSentence(solveOf(ask, over))).toBe(words));
});

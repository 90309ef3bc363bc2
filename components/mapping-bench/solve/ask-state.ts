/** What a solve with a question of its own has answered, and the words for it. */
import type { Pins, Placement } from '@/lib/mapping/mapping';
import { objectiveName, type Weights } from '@/lib/mapping/weights';
import type { Answer, PinPrice } from '@/lib/solver/pin-price';
import { MOST_AVOIDED } from '@/lib/solver/problem';
import { isSettled, otherSide, type PinPriceAsk, pinsOfSide, priceOf } from '@/lib/solver/solve-ask';
import { type AskView, boundText, isLive, type Solve, valueText } from './solve-state';

export type PriceView = Extract<AskView, { kind: 'pin price' }>;

export interface PriceAnswer {
  ask: PriceView;
  price: PinPrice;
  withPin: Answer;
  withoutPin: Answer;
  /** Of the solve; the other side is known for the same. */
  weights: Weights | undefined;
}

/** As far as the solve has come, with what was known of the other side when it was asked for. */
export function priceAnswer(solve: Solve): PriceAnswer | null {
  const { ask, objective, weights } = solve.settings;
  if (ask?.kind !== 'pin price') return null;
  const own = ownAnswer(solve, objective);
  const [withPin, withoutPin] = ask.side === 'with pin' ? [own, ask.other] : [ask.other, own];
  return { ask, price: priceOf(ask.side, own, ask.other), withPin, withoutPin, weights };
}

function ownAnswer({ outcome, bestObjective, bound }: Solve, objective: Answer['objective']): Answer {
  if (outcome) return { ...outcome, objective };
  return {
    status: bestObjective === null ? 'unknown' : 'feasible',
    objective,
    objectiveValue: bestObjective,
    bound,
  };
}

/** The solve of the other side, where it would tell more; null while this one runs or where nothing is open. */
export function furtherAsk(solve: Solve): PinPriceAsk | null {
  const answer = priceAnswer(solve);
  if (!answer || isLive(solve)) return null;
  const { kind, op, tile, side, other } = answer.ask;
  const isKnown = answer.price.kind === 'exact' || answer.price.kind === 'makes infeasible';
  return isKnown || isSettled(other) ? null : { kind, op, tile, side: otherSide(side) };
}

/** The side that is not how the bench is: a mapping of it can be put on the bench together with its pins. */
export const supposedSide = ({ isPinned }: PriceView): PinPriceAsk['side'] =>
  isPinned ? 'without pin' : 'with pin';

/** Whether the answer speaks of the bench's pins as they are now. */
export function speaksOf(pins: Pins, solve: Solve): boolean {
  const { ask } = solve.settings;
  if (ask?.kind !== 'pin price') return false;
  const rest = (all: Pins) => pinsOfSide(all, { ...ask, side: 'without pin' });
  return (pins[ask.op] === ask.tile) === ask.isPinned && samePins(rest(pins), rest(solve.pins));
}

function samePins(a: Pins, b: Pins): boolean {
  const [left, right] = [Object.entries(a), new Map(Object.entries(b))];
  return left.length === right.size && left.every(([op, tile]) => right.get(op) === tile);
}

/** "Without this pin: 38 wire hops, proved. With it: 41 wire hops, proved. The pin costs 3." */
export function priceSentence({ ask, price, withPin, withoutPin, weights }: PriceAnswer): string {
  const side = (answer: Answer) => sideText(answer, weights);
  const [first, second] = ask.isPinned
    ? [`Without this pin: ${side(withoutPin)}`, `With it: ${side(withPin)}`]
    : [`Pinned here: ${side(withPin)}`, `Not pinned: ${side(withoutPin)}`];
  return `${first}. ${second}. ${priceText(price, ask.isPinned, (least) => boundText(least, withPin.objective, weights))}`;
}

function sideText(
  { status, objective, objectiveValue, bound }: Answer,
  weights: Weights | undefined,
): string {
  const hops = objectiveName(objective, weights);
  const least = `at least ${boundText(bound ?? 0, objective, weights)}`;
  if (status === 'infeasible') return 'no legal mapping';
  if (objectiveValue === null) return bound ? `none found, ${least}` : 'none found';
  return status === 'optimal'
    ? `${valueText(objectiveValue)} ${hops}, proved`
    : `${valueText(objectiveValue)} ${hops} found, ${least}`;
}

function priceText(price: PinPrice, isPinned: boolean, leastText: (least: number) => string): string {
  const costs = isPinned ? 'The pin costs' : 'The pin would cost';
  switch (price.kind) {
    case 'exact':
      return `${costs} ${price.hops === 0 ? 'nothing' : valueText(price.hops)}.`;
    case 'between': {
      const least = leastText(price.leastHops);
      return `${costs} ${least === '0' ? 'at most' : `from ${least} to`} ${valueText(price.mostHops)}.`;
    }
    case 'makes infeasible':
      return `The pin ${isPinned ? 'leaves' : 'would leave'} no legal mapping.`;
    case 'unknown':
      return `What the pin ${isPinned ? 'costs' : 'would cost'} is not known yet; a longer time may tell.`;
  }
}

/** Room for the placements of an ask beside the rest of its request. */
const MOST_AVOIDED_CHARACTERS = 300_000;

/** The last of these whole placements, each once, as many as an ask takes. */
export function avoidedPlacements(shown: readonly Placement[], opCount: number): Placement[] {
  const kept = new Map<string, Placement>();
  let characters = 0;
  for (const placement of shown.toReversed()) {
    const entries = Object.entries(placement);
    if (entries.length !== opCount) continue;
    const text = JSON.stringify(entries.sort(([a], [b]) => (a < b ? -1 : 1)));
    if (kept.has(text)) continue;
    characters += text.length;
    if (kept.size === MOST_AVOIDED || characters > MOST_AVOIDED_CHARACTERS) break;
    kept.set(text, placement);
  }
  return [...kept.values()].reverse();
}

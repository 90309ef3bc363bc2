/** Questions to the solver beside the one for the best mapping: another of equal cost, and what a pin costs. */
import { z } from 'zod';
import { tileIdSchema } from '../fabric/fabric';
import { opIdSchema } from '../graph/kernel';
import type { Pins } from '../mapping/mapping';
import { type Answer, type PinPrice, pinPrice } from './pin-price';
import { anotherSchema } from './problem';

/** What a person at a bench asks. */
export const askSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('another'), ...anotherSchema.shape }),
  /** One of the two solves that tell the price of a pin: the op is pinned to the tile, or is not pinned at all. */
  z.strictObject({
    kind: z.literal('pin price'),
    op: opIdSchema,
    tile: tileIdSchema,
    side: z.enum(['with pin', 'without pin']),
  }),
]);
export type Ask = z.infer<typeof askSchema>;
export type AskKind = Ask['kind'];
export type PinPriceAsk = Extract<Ask, { kind: 'pin price' }>;

export const otherSide = (side: PinPriceAsk['side']): PinPriceAsk['side'] =>
  side === 'with pin' ? 'without pin' : 'with pin';

/** The pins of that side's solve; `pins` are those of all ops. */
export function pinsOfSide(pins: Pins, { op, tile, side }: PinPriceAsk): Pins {
  if (side === 'with pin') return { ...pins, [op]: tile };
  const { [op]: _, ...rest } = pins;
  return rest as Pins;
}

/** The price from one side's solve and what is known of the other side. */
export const priceOf = (side: PinPriceAsk['side'], own: Answer, other: Answer): PinPrice =>
  side === 'with pin' ? pinPrice(own, other) : pinPrice(other, own);

/** Nothing more can be learnt by solving it. */
export const isSettled = ({ status }: Answer): boolean => status === 'optimal' || status === 'infeasible';

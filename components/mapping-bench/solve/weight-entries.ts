/** Weights as a person enters them beside a solve: one text for each net or connection. */
import type { Kernel, Op, OpId } from '@/lib/graph/kernel';
import { netsOf } from '@/lib/graph/nets';
import type { Objective } from '@/lib/mapping/mapping';
import { shortName } from '@/lib/mapping/picture/op-label';
import { MOST_WEIGHT, type Weights } from '@/lib/mapping/weights';

/** What can have a weight: a net for `wire`, a connection for `path`. */
export interface WeightRow {
  id: string;
  label: string;
  /** Pointed at on the bench while its field is used. */
  op: OpId;
}

/** What was typed, by id; what is not here is 1. */
export type WeightTexts = Readonly<Record<string, string>>;

/** Names of consumers told before the rest is counted. */
const CONSUMERS_NAMED = 2;

export function weightRows(
  kernel: Kernel,
  ops: ReadonlyMap<OpId, Op>,
  objective: Objective,
): readonly WeightRow[] {
  const nameOf = (id: OpId) => {
    const op = ops.get(id);
    return op ? shortName(op) : id;
  };
  if (objective === 'wire') {
    return netsOf(kernel).map(({ source, consumers }) => {
      const more = consumers.length - CONSUMERS_NAMED;
      const names = consumers.slice(0, CONSUMERS_NAMED).map(nameOf).join(', ');
      return {
        id: source,
        label: `${nameOf(source)} → ${names}${more > 0 ? ` and ${more} more` : ''}`,
        op: source,
      };
    });
  }
  return kernel.edges
    .filter(({ from, to }) => from !== to)
    .map(({ id, from, to, port }) => ({ id, label: `${nameOf(from)} → ${nameOf(to)} ${port}`, op: from }));
}

export const textsOf = (weights: Readonly<Record<string, number>> | undefined): WeightTexts =>
  Object.fromEntries(Object.entries(weights ?? {}).map(([id, weight]) => [id, String(weight)]));

/** Null where the text is no weight. An empty field is 1, as it was before anything was typed. */
export function parseWeight(text: string): number | null {
  const trimmed = text.trim();
  if (trimmed === '') return 1;
  const weight = /^(\d+\.?\d*|\.\d+)(e\+?\d+)?$/i.test(trimmed) ? Number(trimmed) : Number.NaN;
  return weight >= 0 && weight <= MOST_WEIGHT ? weight : null;
}

export const WEIGHT_RULE = 'From 0 to 1,000,000,000';

/** How many of the texts are no weights. */
export const wrongTexts = (texts: WeightTexts): number =>
  Object.values(texts).filter((text) => parseWeight(text) === null).length;

/** How many are other weights than 1. */
export const changedTexts = (texts: WeightTexts): number =>
  Object.values(texts).filter((text) => parseWeight(text) !== 1).length;

/** The weights of both objectives that are none but 1; undefined where nothing is left. */
export function weightsFrom(nets: WeightTexts, edges: WeightTexts): Weights | undefined {
  const numbers = (texts: WeightTexts) =>
    Object.fromEntries(
      Object.entries(texts).flatMap(([id, text]) => {
        const weight = parseWeight(text);
        return weight === null || weight === 1 ? [] : [[id, weight]];
      }),
    );
  const [ofNets, ofEdges] = [numbers(nets), numbers(edges)];
  const hasNets = Object.keys(ofNets).length > 0;
  const hasEdges = Object.keys(ofEdges).length > 0;
  if (!hasNets && !hasEdges) return undefined;
  return { ...(hasNets && { nets: ofNets }), ...(hasEdges && { edges: ofEdges }) };
}

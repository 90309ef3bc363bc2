/** How a thread looks: a colour and a dash rhythm of its own, so that neither colour nor rhythm stands alone. */

/** Dash and gap lengths in px at zoom 1; empty is a whole line. */
const rhythms: readonly (readonly number[])[] = [
  [],
  [9, 4],
  [2, 3],
  [10, 3, 2, 3],
  [5, 3],
  [14, 4],
  [8, 3, 2, 3, 2, 3],
];
const COLOURS = 10;

export interface ThreadStyle {
  /** 1 to 10: the variable --thread-n on screen, the same place in the picture's palette. */
  colour: number;
  dashes: readonly number[];
}

/** The style of a net by its number. Colours and rhythms repeat out of step: 70 pairs before one comes again. */
export const threadStyle = (net: number): ThreadStyle => ({
  colour: (net % COLOURS) + 1,
  dashes: rhythms[net % rhythms.length] ?? [],
});

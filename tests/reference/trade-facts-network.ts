/**
 * Published figures of regular networks. Formulas: W. J. Dally and B. Towles, Principles and Practices of
 * Interconnection Networks (2004), chapters 3 and 5, uniform traffic with each node's own included. The table was
 * recomputed from them by brute force over all pairs; the eight-neighbour row is max(|dx|, |dy|) over all pairs.
 * The even-k mesh figure n·k/3 that is often printed is an approximation and is not used.
 */
export const squareNetworks = [
  { side: 2, meshMean: [1, 1], meshMeanOthers: [4, 3], torusMean: [1, 1], torusMeanOthers: [4, 3], meshDiameter: 2, torusDiameter: 2 },
  { side: 3, meshMean: [16, 9], meshMeanOthers: [2, 1], torusMean: [4, 3], torusMeanOthers: [3, 2], meshDiameter: 4, torusDiameter: 2 },
  { side: 4, meshMean: [5, 2], meshMeanOthers: [8, 3], torusMean: [2, 1], torusMeanOthers: [32, 15], meshDiameter: 6, torusDiameter: 4 },
  { side: 5, meshMean: [16, 5], meshMeanOthers: [10, 3], torusMean: [12, 5], torusMeanOthers: [5, 2], meshDiameter: 8, torusDiameter: 4 },
  { side: 6, meshMean: [35, 9], meshMeanOthers: [4, 1], torusMean: [3, 1], torusMeanOthers: [108, 35], meshDiameter: 10, torusDiameter: 6 },
  { side: 8, meshMean: [21, 4], meshMeanOthers: [16, 3], torusMean: [4, 1], torusMeanOthers: [256, 63], meshDiameter: 14, torusDiameter: 8 },
  { side: 16, meshMean: [85, 8], meshMeanOthers: [32, 3], torusMean: [8, 1], torusMeanOthers: [2048, 255], meshDiameter: 30, torusDiameter: 16 },
] as const;

/** Mean of max(|dx|, |dy|) over all ordered pairs of a square, each node with itself included. */
export const kingMeans = [
  { side: 2, mean: [3, 4] },
  { side: 3, mean: [104, 81] },
  { side: 4, mean: [57, 32] },
  { side: 8, mean: [945, 256] },
] as const;

/** Mean hops of an oblong mesh: (a² − 1)/(3a) + (b² − 1)/(3b); 4 × 8 gives 31/8. */
export const oblongMesh = { rows: 4, cols: 8, mean: [31, 8] } as const;

/** Channels across the middle, both directions together, sides even: mesh 2k, torus 4k. Directed links of a mesh: 4k(k − 1). */
export const meshBisection = (side: number): number => 2 * side;
export const torusBisection = (side: number): number => 4 * side;
export const meshLinks = (side: number): number => 4 * side * (side - 1);

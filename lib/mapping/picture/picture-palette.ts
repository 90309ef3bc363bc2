/** The light theme's colours as values, for pictures that leave the screen. They equal those of the theme's sheet. */
import type { UnitForm } from '../../fabric/unit-library';

export const picturePalette = {
  paper: '#f7f4ec',
  surface: '#fffdf8',
  ink: '#1d2333',
  quiet: '#555b6b',
  rule: '#d9d3c4',
  edge: '#8a8372',
  indigo: '#2b3a8c',
  channel: '#ece5d5',
  tileMemory: '#f0e7d4',
  tileMultiplier: '#e9dfe8',
  tileScratchpad: '#e0eae2',
  tileArithmetic: '#fffefb',
  tileNone: '#f1ede2',
  threads: [
    '#2b3a8c',
    '#a63a2a',
    '#1f6f63',
    '#8a5a00',
    '#6a2f6e',
    '#2a6b8f',
    '#4d6b1e',
    '#5d4a3a',
    '#a8326b',
    '#3d4657',
  ],
} as const;

export function tileTint(form: UnitForm): string {
  switch (form) {
    case 'footBar':
      return picturePalette.tileMemory;
    case 'cornerTicks':
      return picturePalette.tileMultiplier;
    case 'notch':
      return picturePalette.tileScratchpad;
    case 'plain':
    case 'stitched':
      return picturePalette.tileArithmetic;
  }
}

/** The colour of a thread style, which counts from 1. */
export const threadHex = (colour: number): string =>
  picturePalette.threads[(colour - 1) % picturePalette.threads.length] ?? picturePalette.ink;

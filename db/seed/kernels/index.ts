/** The kernels of the Tarnbrook field team, smallest ideas first. */
import type { Kernel } from '@/lib/graph';
import { addCompareSelect, fourierButterfly, loudnessHistogram, waveletStep } from './hive-microphone';
import { gradient, sparseDotProduct, tiltDirection } from './slope-tiltmeter';
import {
  runningVolume,
  scaleAndClamp,
  smoothingFilter,
  sortFourReadings,
  surgeDetector,
} from './stream-gauge';

export interface DemoKernel {
  slug: string;
  kernel: Kernel;
}

export const demoKernels: readonly DemoKernel[] = [
  { slug: 'scale-and-clamp', kernel: scaleAndClamp() },
  { slug: 'running-volume', kernel: runningVolume() },
  { slug: 'sparse-dot-product', kernel: sparseDotProduct() },
  { slug: 'smoothing-filter', kernel: smoothingFilter() },
  { slug: 'surge-detector', kernel: surgeDetector() },
  { slug: 'wavelet-step', kernel: waveletStep() },
  { slug: 'loudness-histogram', kernel: loudnessHistogram() },
  { slug: 'sort-four-readings', kernel: sortFourReadings() },
  { slug: 'fourier-butterfly', kernel: fourierButterfly() },
  { slug: 'add-compare-select', kernel: addCompareSelect() },
  { slug: 'gradient', kernel: gradient() },
  { slug: 'tilt-direction', kernel: tiltDirection() },
];

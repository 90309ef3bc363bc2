import type { Certificate } from '@/lib/mapping/certificate';

/** A certificate of an optimum of 5, of no problem in particular. */
export const sampleCertificate = (more: Partial<Certificate> = {}): Certificate => ({
  format: 'pinloom.certificate',
  formatVersion: 1,
  engineVersion: 1,
  problemDigest: `sha256:${'0'.repeat(64)}`,
  objective: 'wire',
  pins: {},
  start: null,
  engine: 'auto',
  seed: 1,
  searchTries: 1,
  status: 'optimal',
  objectiveValue: 5,
  bound: 5,
  method: 'counting',
  nodes: 0,
  levels: [],
  struckTiles: 0,
  isRepeatable: true,
  ...more,
});

#!/usr/bin/env node
// npm run bench: brings what the measurements need, bundles them, then runs scripts/bench.ts. See --help.
import { ensureDebianPackages } from './debian-packages.mjs';
import { ensureNpmPackages } from './npm-packages.mjs';

ensureDebianPackages(['postgresql', 'chromium']);
ensureNpmPackages();
const { bundle } = await import('./bundle.mjs');
await bundle(['bench', 'bench-solve', 'threads/solver']);
await import('../dist/bench.mjs');

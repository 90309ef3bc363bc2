#!/usr/bin/env node
// npm run bench:solve: brings and bundles what the solver's measurements need, then runs scripts/bench-solve.ts.
import { ensureNpmPackages } from './npm-packages.mjs';

ensureNpmPackages();
const { bundle } = await import('./bundle.mjs');
await bundle(['bench-solve', 'threads/solver']);
await import('../dist/bench-solve.mjs');

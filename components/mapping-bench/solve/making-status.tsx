'use client';

import type { Provenance } from '@/lib/mapping/mapping';
import { objectiveName } from '@/lib/mapping/weights';
import { useBench } from '../store/bench-context';
import { ProofDetails } from './proof-details';
import type { ProofFiles } from './proof-words';
import { boundText, durationText, gapText, valueText } from './solve-state';

/** What was proved of the mapping on the bench. */
export function MakingStatus({ files }: { files: ProofFiles }) {
  const provenance = useBench((state) => state.content.provenance);
  const placedOps = useBench((state) => state.facts.metrics.placedOps);
  if (placedOps === 0) return <p className="text-sm text-quiet">Nothing is placed yet.</p>;
  return <ProvedBlock provenance={provenance} files={files} href={null} />;
}

interface ProvedBlockProps {
  provenance: Provenance;
  files: ProofFiles;
  /** Where the certificate lies as a file, if it does. */
  href: string | null;
}

/** "Proved optimal · 0.4 s", or how far the mapping may be off, or that it is made by hand. */
export function ProvedBlock({ provenance, files, href }: ProvedBlockProps) {
  if (provenance.by === 'hand')
    return <p className="text-sm text-quiet">Placed by hand; nothing is proved.</p>;
  const { objective, weights, objectiveValue, bound, status, elapsedMs, changedByHand, certificate } =
    provenance;
  const name = objectiveName(objective, weights);
  const value = valueText(objectiveValue);
  const least = boundText(bound, objective, weights);
  if (changedByHand) {
    return (
      <p className="text-sm text-quiet">
        Changed by hand since the solve, which had found {value} {name}
        {status === 'optimal' ? ' and proved them optimal' : `, lower bound ${least}`}.
      </p>
    );
  }
  if (status === 'optimal') {
    return (
      <>
        <p className="rounded border border-verdigris! bg-verdigris-wash px-2 py-1 text-center text-sm font-semibold text-verdigris">
          ✓ Proved optimal · {durationText(elapsedMs)}
        </p>
        <p className="mt-1 text-sm text-quiet">
          No legal mapping has fewer than {value} {name}.
        </p>
        {certificate ? <ProofDetails certificate={certificate} files={files} href={href} /> : null}
      </>
    );
  }
  return (
    <>
      <p className="rounded border border-edge! bg-surface px-2 py-1 text-center text-sm font-semibold">
        Feasible, {gapText(objectiveValue, bound)}
      </p>
      <p className="mt-1 text-sm text-quiet">
        {value} {name}, lower bound {least}, after {durationText(elapsedMs)}.
      </p>
    </>
  );
}

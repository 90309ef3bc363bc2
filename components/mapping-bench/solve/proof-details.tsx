'use client';

import { Button, ButtonLink } from '@/components/ui/button';
import { useToast } from '@/components/ui/toast';
import { writeCertificateJson } from '@/lib/formats/certificate-json';
import type { Certificate } from '@/lib/mapping/certificate';
import { unequalWeights } from '@/lib/mapping/weights';
import { methodSentence, type ProofFiles, proveCommand, repeatSentence } from './proof-words';
import { valueText } from './solve-state';

interface ProofDetailsProps {
  certificate: Certificate;
  files: ProofFiles;
  /** Where the certificate lies as a file; null: it is made of what is here. */
  href: string | null;
}

/** "How it was proved": what the certificate says, as a file too, and the command that derives it again. */
export function ProofDetails({ certificate, files, href }: ProofDetailsProps) {
  const file =
    href ?? `data:application/json;charset=utf-8,${encodeURIComponent(writeCertificateJson(certificate))}`;
  return (
    <details className="mt-2 text-sm">
      <summary className="min-h-6 text-xs font-semibold tracking-[0.12em] text-quiet uppercase">
        How it was proved
      </summary>
      <p className="mt-1">{methodSentence(certificate)}</p>
      <ProofFigures certificate={certificate} />
      <Levels levels={certificate.levels} />
      <p className="mt-2 text-quiet">Digest of the problem</p>
      <p className="font-mono text-xs break-all">{certificate.problemDigest}</p>
      <p className="mt-2 text-quiet">
        To derive it again, with the kernel, the fabric and this certificate as files
      </p>
      <Command text={proveCommand(files)} />
      <p className="mt-1 text-quiet">{repeatSentence(certificate)}</p>
      <ButtonLink className="mt-2 w-full" href={file} download={files.certificate}>
        Certificate, JSON
      </ButtonLink>
    </details>
  );
}

const grouped = (value: number): string => value.toLocaleString('en-GB');
const opsText = (record: object | null): string => {
  const count = Object.keys(record ?? {}).length;
  return count === 0 ? 'none' : `${count} ${count === 1 ? 'op' : 'ops'}`;
};

function ProofFigures({ certificate }: { certificate: Certificate }) {
  const weighted = unequalWeights(certificate.weights, certificate.objective).length;
  const rows: [string, string | number][] = [
    ['Engine version', certificate.engineVersion],
    ['Nodes', grouped(certificate.nodes)],
    ['Choices struck out', grouped(certificate.struckTiles)],
    ['Seed', certificate.seed],
    ['Pinned', opsText(certificate.pins)],
    ...(weighted > 0 ? [['Weights other than 1', weighted] as [string, number]] : []),
    ['Placed at the start', opsText(certificate.start)],
  ];
  return (
    <dl className="mt-2">
      {rows.map(([label, value]) => (
        <div key={label} className="flex justify-between gap-3 py-0.5">
          <dt className="text-quiet">{label}</dt>
          <dd className="font-mono font-semibold tabular-nums">{value}</dd>
        </div>
      ))}
    </dl>
  );
}

/** No legal mapping costs at most the cutoff, or none less than the best one: what so many nodes have shown. */
function Levels({ levels }: Pick<Certificate, 'levels'>) {
  if (levels.length === 0) return null;
  return (
    <table className="mt-2 w-full">
      <caption className="text-left text-quiet">Levels: nothing better up to the cutoff</caption>
      <thead>
        <tr className="text-left text-xs">
          <th scope="col">Cutoff</th>
          <th scope="col" className="text-right">
            Nodes
          </th>
        </tr>
      </thead>
      <tbody className="font-mono tabular-nums">
        {levels.map(({ cutoff, nodes }, i) => (
          <tr key={i} className="border-t border-rule">
            <td className="py-0.5">{valueText(cutoff)}</td>
            <td className="text-right">{grouped(nodes)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Command({ text }: { text: string }) {
  const say = useToast();
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(text);
      say('The command is copied.');
    } catch {
      say('The browser does not allow copying here: select the command and copy it.', { tone: 'broken' });
    }
  };
  return (
    <>
      <code className="mt-1 block rounded border border-rule bg-surface px-2 py-1 font-mono text-xs wrap-anywhere">
        {text}
      </code>
      <Button look="secondary" className="mt-1 w-full" onClick={copy}>
        Copy the command
      </Button>
    </>
  );
}

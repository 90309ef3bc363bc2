import { execFileSync } from 'node:child_process';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseKernelDot, writeKernelDot } from '@/lib/formats/kernel-dot';
import { parseKernelJson, writeKernelJson } from '@/lib/formats/kernel-json';
import type { Kernel } from '@/lib/graph';
import { anyKernel } from '../graph/kernel-arbitrary';

const SEED = 20260303;

test('writing a kernel as JSON and reading it gives the kernel back', () => {
  fc.assert(
    fc.property(anyKernel(), (kernel) => {
      expect(parseKernelJson(writeKernelJson(kernel))).toEqual({ ok: true, value: kernel });
    }),
    { seed: SEED, numRuns: 300 },
  );
});

test('writing a kernel as DOT and reading it gives the kernel back', () => {
  fc.assert(
    fc.property(anyKernel(), (kernel) => {
      expect(parseKernelDot(writeKernelDot(kernel))).toEqual({ ok: true, value: kernel });
    }),
    { seed: SEED, numRuns: 300 },
  );
});

test('the order of names in records does not change the text', () => {
  fc.assert(
    fc.property(anyKernel(), (kernel) => {
      const turned: Kernel = {
        ...kernel,
        ops: kernel.ops.map((op) => ({
          ...op,
          params: Object.fromEntries(Object.entries(op.params).reverse()),
        })),
      };
      expect(writeKernelJson(turned)).toBe(writeKernelJson(kernel));
      expect(writeKernelDot(turned)).toBe(writeKernelDot(kernel));
    }),
    { seed: SEED, numRuns: 50 },
  );
});

interface GraphvizGraph {
  name: string;
  objects?: { _gvid: number; name: string; kind: string; widthBits: string }[];
  edges?: { tail: number; head: number; id: string; port: string; distance?: string }[];
}

/** Checked against the reader of Graphviz 2.43 (`dot -Tjson0`, Debian package graphviz). */
test('Graphviz reads the DOT of any kernel as the same nodes and edges', () => {
  fc.assert(
    fc.property(anyKernel(), (kernel) => {
      const text = writeKernelDot(kernel);
      const json = execFileSync('dot', ['-Tdot_json'], {
        input: text,
        encoding: 'utf8',
        stdio: ['pipe', 'pipe', 'pipe'],
      });
      const graph: GraphvizGraph = JSON.parse(json);
      const objects = graph.objects ?? [];
      expect(objects.map(({ name, kind, widthBits }) => [name, kind, Number(widthBits)])).toEqual(
        kernel.ops.map((op) => [op.id, op.kind, op.widthBits]),
      );
      const nameOf = new Map(objects.map((one) => [one._gvid, one.name]));
      const edges = (graph.edges ?? []).map((edge) => [
        edge.id,
        nameOf.get(edge.tail),
        nameOf.get(edge.head),
        edge.port,
        Number(edge.distance ?? 0),
      ]);
      expect(edges.sort()).toEqual(
        kernel.edges.map((edge) => [edge.id, edge.from, edge.to, edge.port, edge.distance]).sort(),
      );
    }),
    { seed: SEED, numRuns: 40 },
  );
});

const hostile = fc.oneof(
  fc.string({ maxLength: 200 }),
  fc
    .array(
      fc.constantFrom(
        'digraph',
        '{',
        '}',
        '[',
        ']',
        '->',
        ';',
        ',',
        '=',
        '"',
        '\\',
        'a',
        'kind',
        'add',
        '/*',
        '*/',
        '#',
        '\n',
        '<',
        '>',
        ':',
        '1',
        'node',
        'subgraph',
        '__proto__',
        ' ',
      ),
      { maxLength: 60 },
    )
    .map((parts) => parts.join('')),
);

test('any text is answered with a kernel or with errors whose places lie within it', () => {
  fc.assert(
    fc.property(
      fc.oneof(
        hostile,
        hostile.map((text) => `digraph { ${text} }`),
      ),
      (text) => {
        const lines = text.split(/\r\n|\r|\n/);
        for (const result of [parseKernelDot(text), parseKernelJson(text)]) {
          if (result.ok) continue;
          expect(result.errors.length).toBeGreaterThan(0);
          for (const error of result.errors) {
            expect(error.line).toBeLessThanOrEqual(lines.length);
            expect(error.column).toBeLessThanOrEqual((lines[error.line - 1]?.length ?? 0) + 1);
          }
        }
      },
    ),
    { seed: SEED, numRuns: 1500 },
  );
});

test('a changed character in a JSON text is never answered with an exception', () => {
  fc.assert(
    fc.property(
      anyKernel(4),
      fc.nat(),
      fc.constantFrom('"', '{', '}', ',', 'x', '0', '\\', '\n', ':'),
      (kernel, at, char) => {
        const text = writeKernelJson(kernel);
        const offset = at % text.length;
        const broken = text.slice(0, offset) + char + text.slice(offset + 1);
        const result = parseKernelJson(broken);
        let builtIn = true;
        try {
          JSON.parse(broken);
        } catch {
          builtIn = false;
        }
        // Whatever the platform's own parser refuses is refused here too.
        expect(result.ok && !builtIn).toBe(false);
      },
    ),
    { seed: SEED, numRuns: 500 },
  );
});

import { describe, expect, test } from 'vitest';
import { demoKernels } from '@/db/seed/kernels';
import { parseKernelDot, writeKernelDot } from '@/lib/formats/kernel-dot';
import type { Kernel } from '@/lib/graph';

const read = (text: string): Kernel => {
  const result = parseKernelDot(text);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return result.value;
};
const errors = (text: string): string[] => {
  const result = parseKernelDot(text);
  return result.ok ? [] : result.errors.map(({ line, column, message }) => `${line}:${column} ${message}`);
};
const edges = (kernel: Kernel) =>
  kernel.edges.map(
    ({ from, to, port, distance }) => `${from} ${to}.${port}${distance === 0 ? '' : ` +${distance}`}`,
  );

test.each(demoKernels.map(({ slug, kernel }) => [slug, kernel] as const))(
  '%s comes back from DOT as it was',
  (_, kernel) => {
    expect(parseKernelDot(writeKernelDot(kernel))).toEqual({ ok: true, value: kernel });
  },
);

test('a hand-written filter: defaults, groups, subgraphs, symbols, quoted names, comments', () => {
  const kernel = read(`# two taps
    digraph fir {
      rankdir=LR; node [widthBits=32, shape=box]; // all ops
      x [kind=load, array=gauge];
      subgraph cluster_taps { node [kind=mul imm_b=3]; m1; m2 [imm_b=-5] };
      x -> {m1; m2} /* both taps */
      "sum of taps" [label="+"];
      m1 -> "sum of taps"; m2 -> "sum of taps" [distance=2, initialValues="0 1"];
      out [kind=st][array=y];
      "sum of taps":e -> out:value:w;
    }`);
  expect(kernel.name).toBe('fir');
  expect(
    kernel.ops.map(({ id, kind, label, widthBits, immediates }) => [id, kind, label, widthBits, immediates]),
  ).toEqual([
    ['op_x', 'load', 'x', 32, {}],
    ['op_m1', 'multiply', 'm1', 32, { b: 3 }],
    ['op_m2', 'multiply', 'm2', 32, { b: -5 }],
    ['op_sumoftaps', 'add', 'sum of taps', 32, {}],
    ['op_out', 'store', 'out', 32, {}],
  ]);
  expect(kernel.ops[0]?.params).toEqual({ array: 'gauge', base: 0, stride: 1 });
  expect(kernel.ops[4]?.params).toEqual({ array: 'y', base: 0, stride: 1 });
  expect(edges(kernel)).toEqual([
    'op_x op_m1.a',
    'op_x op_m2.a',
    'op_m1 op_sumoftaps.a',
    'op_m2 op_sumoftaps.b +2',
    'op_sumoftaps op_out.value',
  ]);
  expect(kernel.edges[3]?.initialValues).toEqual([0, 1]);
  expect(new Set(kernel.ops.map((op) => `${op.positionPx.x},${op.positionPx.y}`)).size).toBe(5);
});

test('connections that name their operand take it before those that do not', () => {
  const kernel = read('digraph { node [kind=load] x; y; s [kind=subtract]; x -> s; y -> s [port=a] }');
  expect(edges(kernel)).toEqual(['op_x op_s.b', 'op_y op_s.a']);
});

test('a chain is a connection for each arrow', () => {
  const kernel = read('digraph { a [kind=load]; node [kind=pass]; z [kind=store]; a -> b -> c -> z }');
  expect(edges(kernel)).toEqual(['op_a op_b.value', 'op_b op_c.value', 'op_c op_z.value']);
});

test('names that the prototype of objects has are names like any other', () => {
  const kernel = read(
    'digraph { __proto__ [kind=load]; constructor [kind=store]; __proto__ -> constructor }',
  );
  expect(edges(kernel)).toEqual(['op___proto__ op_constructor.value']);
});

describe('errors stand where the fault is', () => {
  test.each<[string, string, string[]]>([
    ['no kind', 'digraph { a }', ['1:11 “a” has no kind: add the attribute kind, such as kind=add.']],
    ['an unknown kind', 'digraph {\n  a [kind=frob]\n}', ['2:11 “frob” is no kind of operation.']],
    [
      'an unknown attribute',
      'digraph { a [kind=add, zap=1] }',
      ['1:24 An op of the kind add has no attribute “zap”.'],
    ],
    [
      'a parameter of another kind',
      'digraph { a [kind=add, stride=1] }',
      ['1:24 An op of the kind add has no attribute “stride”.'],
    ],
    [
      'a constant without an operand',
      'digraph { a [kind=add, imm_c=1] }',
      ['1:24 An op of the kind add has no operand “c”.'],
    ],
    [
      'a constant that is no integer',
      'digraph { a [kind=add, imm_b=1.5] }',
      ['1:30 “1.5” cannot be the value of “imm_b”: give an integer of 32 bits.'],
    ],
    [
      'a width',
      'digraph { a [kind=add, widthBits=12] }',
      ['1:34 “12” cannot be the value of “widthBits”: give 8, 16 or 32.'],
    ],
    [
      'a stride',
      'digraph { a [kind=load, stride=70000] }',
      ['1:32 “70000” cannot be the value of “stride”: give an integer from -65536 to 65536.'],
    ],
    [
      'a port',
      'digraph { a [kind=load]; b [kind=store]; a -> b [port=q] }',
      ['1:55 An op of the kind store has no operand “q”.'],
    ],
    [
      'a port behind the name',
      'digraph { a [kind=load]; b [kind=store]; a -> b:q }',
      ['1:49 An op of the kind store has no operand “q”.'],
    ],
    [
      'a distance',
      'digraph { a [kind=load]; b [kind=store]; a -> b [distance=-1] }',
      ['1:59 “-1” cannot be the value of “distance”: give an integer from 0 to 64.'],
    ],
    [
      'an attribute of a connection',
      'digraph { a [kind=load]; b [kind=store]; a -> b [lag=1] }',
      ['1:50 A connection has no attribute “lag”.'],
    ],
    ['an attribute of the kernel', 'digraph { speed=3 }', ['1:11 A kernel has no attribute “speed”.']],
    [
      'one connection too many',
      'digraph { a [kind=load]; b [kind=store]; a -> b; a -> b }',
      ['1:55 “b” has no operand left for this connection: name one by the attribute port or remove it.'],
    ],
    [
      'an operand driven twice',
      'digraph { a [kind=load]; b [kind=store, imm_value=1]; a -> b [port=value] }',
      ['1:68 The operand “value” of “b” is driven already: keep one constant or connection.'],
    ],
    [
      'a store with a user',
      'digraph { a [kind=store, imm_value=1]; b [kind=store]; a -> b }',
      ['1:56 An op of the kind store has no result to connect.'],
    ],
    [
      'several faults',
      'digraph {\n a [kind=frob];\n b [kind=add, zap=1];\n c [kind=load, base=x]\n}',
      [
        '2:10 “frob” is no kind of operation.',
        '3:15 An op of the kind add has no attribute “zap”.',
        '4:21 “x” cannot be the value of “base”: give an integer from -2147483647 to 2147483647.',
      ],
    ],
    [
      'an HTML label',
      'digraph { a [kind=add, label=<b>] }',
      ['1:30 The value of “label” is HTML, which is not read: write a plain or quoted text.'],
    ],
    [
      'an undirected graph',
      'graph { a -- b }',
      ['1:1 Connections of a kernel have a direction: write “digraph” and “->”.'],
    ],
    [
      'an arrow in a graph',
      'graph { a -> b }',
      ['1:11 Connections with a direction need a digraph: write “digraph” in place of “graph”.'],
    ],
    ['a line in a digraph', 'digraph { a -- b }', ['1:13 In a digraph, connections are written with ->.']],
    [
      'a strict graph',
      'strict digraph { }',
      [
        '1:1 A strict graph has one connection at most between two ops, which a kernel may need more of: remove the word “strict”.',
      ],
    ],
    [
      'a bracket too few',
      'digraph {\n  a [kind=add;\n}',
      ['3:1 Found “}”, expected ], a name, a number or a quoted string.'],
    ],
    ['an empty text', '', ['1:1 Found the end of the text, expected digraph, graph or strict.']],
    ['a second graph', 'digraph { } digraph { }', ['1:13 Found “d”, expected the end of the text.']],
  ])('%s', (_, text, expected) => {
    expect(errors(text)).toEqual(expected);
  });

  test('what could stand there is told by itself as well', () => {
    const result = parseKernelDot('digraph { a [kind=load]; b [kind=select]; a -> b [port=q] }');
    expect(result.ok ? [] : result.errors[0]?.expected).toBe(
      'condition, whenTrue, whenFalse, predicate, fallback',
    );
  });
});

describe('hostile texts are refused within bounds', () => {
  test.each<[string, string, string]>([
    ['2 MB', ' '.repeat(2_000_001), 'The text has 2000001 characters; at most 2000000 are read.'],
    ['deep braces', `digraph ${'{'.repeat(100_000)}`, 'Subgraphs nest deeper than 48 levels.'],
    ['a long chain', `digraph { a${' -> a'.repeat(5000)} }`, 'goes on for too long'],
    [
      'attributes',
      `digraph { a [${'b=1 '.repeat(100_000)}] }`,
      'The graph has more than 60000 attributes: use the JSON format.',
    ],
    ['statements', `digraph { ${'a;'.repeat(200_000)} }`, 'The graph is too large to read as DOT'],
    [
      'ops',
      `digraph { node [kind=load]; ${Array.from({ length: 2001 }, (_, i) => `n${i};`).join('')} }`,
      'A kernel has at most 2000 ops.',
    ],
    [
      'a product of groups',
      `digraph { node [kind=load]; {${Array.from({ length: 400 }, (_, i) => `n${i}`).join(' ')}} a -> {${'a '.repeat(9000)}} }`,
      'A kernel has at most 8000 connections.',
    ],
    [
      'defaults for many ops',
      `digraph { node [${Array.from({ length: 5000 }, (_, i) => `k${i}=1`).join()}] ${Array.from({ length: 2000 }, (_, i) => `n${i};`).join('')} }`,
      'There are more than 100 attributes in one place.',
    ],
    ['comments without end', `digraph { ${'/* '.repeat(300_000)}`, 'Found the end of the text, expected */.'],
    ['quotes without end', `digraph { a [label="${'\\"'.repeat(300_000)}`, 'Found the end of the text'],
  ])(
    '%s',
    (_, text, message) => {
      const startMs = performance.now();
      expect(errors(text).join('\n')).toContain(message);
      expect(performance.now() - startMs).toBeLessThan(15_000);
    },
    20_000,
  );
});

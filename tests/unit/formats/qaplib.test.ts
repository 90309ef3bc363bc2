import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { parseQaplib, QAPLIB_LIMITS } from '@/lib/formats/qaplib';

const read = (text: string) => {
  const parsed = parseQaplib(text);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.errors));
  const { n, first, second } = parsed.value;
  return { n, first: [...first], second: [...second] };
};
const faults = (text: string) => {
  const parsed = parseQaplib(text);
  return parsed.ok ? [] : parsed.errors;
};
const small = { n: 2, first: [0, 3, 3, 0], second: [0, 5, 6, 0] };

describe('reading QAPLIB text', () => {
  it.each([
    ['blank lines between the matrices', '2\n\n0 3\n3 0\n\n0 5\n6 0\n'],
    ['everything on one line, without an end of line', '2 0 3 3 0 0 5 6 0'],
    [
      'rows broken over lines, CR LF, tabs and a byte order mark',
      '\uFEFF 2\r\n0\r\n3\t3 0\r\n\r\n0 5 6\r\n0\r\n\r\n',
    ],
    ['signs and zeros in front', '2 -0 +3 03 0 0 5 06 0'],
  ])('takes %s', (_, text) => {
    expect(read(text)).toEqual(small);
  });

  it('takes size 1, entries below 0 and the largest size', () => {
    expect(read('1 -4 7')).toEqual({ n: 1, first: [-4], second: [7] });
    const n = QAPLIB_LIMITS.n;
    expect(read(`${n}${' 1'.repeat(2 * n * n)}`).n).toBe(200);
  });

  // The rows as they stand in the file.
  it('keeps rows rows: tai12b as published', () => {
    const { n, first, second } = read(readFileSync('tests/reference/qaplib/tai12b.dat', 'utf8'));
    expect(n).toBe(12);
    expect(first.slice(0, 12)).toEqual([0, 0, 0, 255, 293, 328, 331, 318, 362, 221, 314, 390]);
    expect(second.slice(12, 24)).toEqual([1, 0, 14568, 1064, 4, 0, 58098, 6273, 2, 3, 0, 57]);
    expect(second.slice(-12)).toEqual([0, 36146, 0, 0, 525, 49, 1, 19, 0, 0, 35539, 0]);
  });
});

describe('refusing QAPLIB text', () => {
  it.each([
    ['an empty text', '', 1, 1, /empty/, /from 1 to 200/],
    ['white space only', ' \n\n', 3, 1, /empty/, /from 1 to 200/],
    ['a size of 0', '0', 1, 1, /“0”/, /from 1 to 200/],
    ['a size below 0', '\n  -3 1 2', 2, 3, /“-3”/, /from 1 to 200/],
    ['a size that is no number', 'nug12\n', 1, 1, /“nug12”/, /from 1 to 200/],
    ['a size above the limit', '201', 1, 1, /“201”/, /from 1 to 200/],
    ['a fraction', '2\n0 3\n3.5 0\n0 5 6 0', 3, 1, /“3\.5”/, /whole number/],
    ['a word', '2\n0 3\n3 0\n0 five 6 0', 4, 3, /“five”/, /whole number/],
    ['NaN', '1 NaN 1', 1, 3, /“NaN”/, /whole number/],
    ['infinity', '1 1 Infinity', 1, 5, /“Infinity”/, /whole number/],
    ['an exponent', '1 1e3 1', 1, 3, /“1e3”/, /whole number/],
    ['a comma', '2\n0,3\n3,0', 2, 1, /“0,3”/, /whole number/],
    ['a number beyond 2^53', '1 9007199254740993 1', 1, 3, /“9007199254740993”/, /9007199254740991/],
    ['too few entries', '2\n0 3\n3 0\n0 5\n6', 5, 2, /ends after 7 of 8/, /whole number/],
    ['no matrix at all', '2\n', 2, 1, /ends after 0 of 8/, /whole number/],
    ['too many entries', '2\n0 3\n3 0\n0 5\n6 0\n9', 6, 1, /“9” after the last/, /end of the text/],
  ])('%s, at its line and column, with what was expected', (_, text, line, column, message, expected) => {
    const [fault] = faults(text);
    expect(fault).toMatchObject({ line, column });
    expect(fault?.message).toMatch(message);
    expect(fault?.expected).toMatch(expected);
  });

  it('names matrix, row and column, and every bad entry', () => {
    expect(faults('2\n0 x\n3 0\n0 5\ny 0').map(({ path }) => path)).toEqual([
      'first matrix, row 1, column 2',
      'second matrix, row 2, column 1',
    ]);
  });

  it('stops at 20 faults', () => {
    expect(faults(`5 ${'x '.repeat(50)}`)).toHaveLength(20);
  });

  it('shows long and unprintable words short and printable', () => {
    const [fault] = faults(`1 ${'z'.repeat(500)}\u0007 1`);
    expect(fault?.message).toBe(`Found “${'z'.repeat(24)}…”.`);
    expect(faults('1 \u0007 1')[0]?.message).toBe('Found “U+7”.');
  });

  // 2² · 3·10⁷ · 5·10⁶ = 6·10¹⁴ is above 2⁵³ / 16 = 5.6·10¹⁴.
  it('entries whose sums could be rounded, at the largest of them', () => {
    const [fault] = faults('2\n0 3\n30000000 0\n0 5000000\n6 0');
    expect(fault).toMatchObject({ line: 3, column: 1, path: 'first matrix, row 2, column 1' });
    expect(fault?.message).toMatch(/too large together/);
    expect(faults('2\n0 3\n20000000 0\n0 5000000\n6 0')).toEqual([]);
  });

  it('a text of more than 4 million characters', () => {
    expect(faults(' '.repeat(QAPLIB_LIMITS.textLength + 1))[0]).toMatchObject({ line: 1, column: 1 });
  });
});

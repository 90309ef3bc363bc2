import { describe, expect, it } from 'vitest';
import { nextPath } from '../../../app/(auth)/next-path';

describe('where to go after signing in', () => {
  it.each(['/', '/w/tarnbrook/kernels', '/invite/abc?x=1#y'])('is a path of ours: %s', (path) => {
    expect(nextPath(path)).toBe(path);
  });
  it.each([
    'https://other.example',
    '//other.example',
    '/\\other.example',
    '/\t/other.example',
    'javascript:alert(1)',
    'w/tarnbrook',
    '',
    undefined,
    ['/w'],
    `/${'a'.repeat(600)}`,
  ])('is never another site or nonsense: %s', (path) => {
    expect(nextPath(path)).toBe('/');
  });
});

import { describe, expect, it } from 'vitest';
import { slugOf } from '../../../app/_server/accounts/slug';
import { newId } from '../../../db/ids';
import { idKinds, idSchema, parseId } from '../../../lib/ids';
import { roleReaches } from '../../../lib/roles';

describe('an id', () => {
  it.each(idKinds)('of kind %s has its kind and 26 characters of 5 bits, 130 in all', (kind) => {
    const id = newId(kind);
    expect(id).toMatch(/^[a-z]+_[0-9a-hjkmnp-tv-z]{26}$/);
    expect(parseId(kind, id)).toBe(id);
  });
  it('is refused as one of another kind', () => {
    expect(parseId('fabric', newId('kernel'))).toBeNull();
    expect(idSchema('kernel').safeParse(`${newId('kernel')}x`).success).toBe(false);
  });
  it('is never the same twice', () => {
    expect(new Set(Array.from({ length: 1000 }, () => newId('kernel'))).size).toBe(1000);
  });
});

describe('a role', () => {
  it.each([
    ['viewer', 'viewer', true],
    ['viewer', 'reviewer', false],
    ['reviewer', 'editor', false],
    ['editor', 'reviewer', true],
    ['owner', 'owner', true],
  ] as const)('%s reaches %s: %s', (role, needed, expected) => {
    expect(roleReaches(role, needed)).toBe(expected);
  });
});

describe('the name of a workspace in addresses', () => {
  it.each([
    ['Tarnbrook field team', 'tarnbrook-field-team'],
    ['  Bäche & Wiesen  ', 'bache-wiesen'],
    ['***', 'workspace'],
    [`${'a'.repeat(39)} b`, 'a'.repeat(39)],
  ])('of "%s" is %s', (name, slug) => {
    expect(slugOf(name)).toBe(slug);
  });
});

import { createHash } from 'node:crypto';
import { expect, it } from 'vitest';
import { sha256Hex } from '@/lib/solver/sha256';

it.each([
  // NIST, "Example values": SHA256.pdf (one block, two blocks); the empty text is of the SHA test vectors (FIPS 180-4).
  ['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'],
  [
    'abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq',
    '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
  ],
  ['', 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'],
])('hashes %j as the standard says', (text, hash) => {
  expect(sha256Hex(text)).toBe(hash);
});

it("agrees with Node's own for every length around the ends of blocks, beyond ASCII too", () => {
  for (let length = 0; length < 200; length++) {
    const text = 'wéft→'.repeat(40).slice(0, length);
    expect(sha256Hex(text)).toBe(createHash('sha256').update(text).digest('hex'));
  }
});

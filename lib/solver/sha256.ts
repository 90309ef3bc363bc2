/**
 * SHA-256 (FIPS 180-4: constants of sections 4.2.2 and 5.3.3, padding of 5.1.1, computation of 6.2.2), as `lib` uses no
 * Node built-ins and the browser's digest cannot be awaited in a solve. Linear in the text.
 */
const PRIMES = firstPrimes(64);
const BLOCK_BYTES = 64;

/** The first 32 bits of the fraction: well within the 53 bits of a double's root. */
const fraction = (root: number): number => Math.floor((root - Math.floor(root)) * 2 ** 32);
const ROUNDS = Uint32Array.from(PRIMES, (prime) => fraction(Math.cbrt(prime)));
const START = Uint32Array.from(PRIMES.slice(0, 8), (prime) => fraction(Math.sqrt(prime)));

/** 64 hexadecimal digits: the hash of the text's UTF-8 bytes. */
export function sha256Hex(text: string): string {
  const message = padded(new TextEncoder().encode(text));
  const hash = START.slice();
  const schedule = new Uint32Array(64);
  for (let offset = 0; offset < message.byteLength; offset += BLOCK_BYTES) {
    fillSchedule(schedule, message, offset);
    addBlock(hash, schedule);
  }
  return Array.from(hash, (word) => word.toString(16).padStart(8, '0')).join('');
}

/** A single 1 bit, zeros up to 8 bytes before the end of a block, the length in bits. */
function padded(bytes: Uint8Array): DataView {
  const length = Math.ceil((bytes.length + 9) / BLOCK_BYTES) * BLOCK_BYTES;
  const padding = new Uint8Array(length);
  padding.set(bytes);
  padding[bytes.length] = 0x80;
  const view = new DataView(padding.buffer);
  view.setBigUint64(length - 8, BigInt(bytes.length) * 8n);
  return view;
}

const rotated = (word: number, by: number): number => (word >>> by) | (word << (32 - by));

function fillSchedule(schedule: Uint32Array, message: DataView, offset: number): void {
  for (let t = 0; t < 16; t++) schedule[t] = message.getUint32(offset + 4 * t);
  for (let t = 16; t < 64; t++) {
    const [far, near] = [schedule[t - 15] as number, schedule[t - 2] as number];
    const sigma0 = rotated(far, 7) ^ rotated(far, 18) ^ (far >>> 3);
    const sigma1 = rotated(near, 17) ^ rotated(near, 19) ^ (near >>> 10);
    schedule[t] = (schedule[t - 16] as number) + sigma0 + (schedule[t - 7] as number) + sigma1;
  }
}

function addBlock(hash: Uint32Array, schedule: Uint32Array): void {
  let [a, b, c, d, e, f, g, h] = hash as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  for (let t = 0; t < 64; t++) {
    const sum1 = rotated(e, 6) ^ rotated(e, 11) ^ rotated(e, 25);
    const choice = (e & f) ^ (~e & g);
    const first = (h + sum1 + choice + (ROUNDS[t] as number) + (schedule[t] as number)) | 0;
    const sum0 = rotated(a, 2) ^ rotated(a, 13) ^ rotated(a, 22);
    const majority = (a & b) ^ (a & c) ^ (b & c);
    const second = (sum0 + majority) | 0;
    [h, g, f, e, d, c, b, a] = [g, f, e, (d + first) | 0, c, b, a, (first + second) | 0];
  }
  [a, b, c, d, e, f, g, h].forEach((word, i) => {
    hash[i] = (hash[i] as number) + word;
  });
}

function firstPrimes(count: number): number[] {
  const primes: number[] = [];
  for (let candidate = 2; primes.length < count; candidate++) {
    if (primes.every((prime) => candidate % prime !== 0)) primes.push(candidate);
  }
  return primes;
}

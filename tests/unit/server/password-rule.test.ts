import { describe, expect, it } from 'vitest';
import { passwordProblem } from '../../../app/_server/accounts/password-rule';

const context = { email: 'architect@tarnbrook.example', name: 'Ada Brook', workspaceName: 'Alpine stream' };
const accepted = (password: string) => passwordProblem(password, context) === null;

// NIST SP 800-63B-4 (2025) §3.1.1.2: at least 15 code points alone, at least 64 permitted, no rules of composition,
// a list of refused whole passwords.
describe('a password', () => {
  it('has 15 characters or more: 14 are refused, 15 accepted', () => {
    expect(accepted('threads in rain'.slice(0, 14))).toBe(false);
    expect(accepted('threads in rain')).toBe(true);
  });

  it('is counted in code points: 14 looms of two UTF-16 units each are too short', () => {
    const looms = ['🧵', '🪡', '🧶'];
    const made = (length: number) => Array.from({ length }, (_, i) => looms[(i * i) % 3] ?? '').join('');
    expect(made(14).length).toBe(28);
    expect(passwordProblem(made(14), context)).toMatch(/at least 15/);
  });

  it('may have 64 characters and more, up to 200', () => {
    const long = 'a stream runs past the slope and the hive hums in the evening sun ';
    expect(accepted(long)).toBe(true);
    expect(accepted(long.repeat(3))).toBe(true);
    expect(accepted(long.repeat(4))).toBe(false);
  });

  it.each(['threadsinrainyday', 'THREADS IN RAINY DAY', '1958 2036 7714 0092', 'ναυς επι θαλασσης'])(
    'needs no mixture of kinds: %s',
    (password) => expect(accepted(password)).toBe(true),
  );

  it.each(['PasswordPassword', 'correct horse battery staple', 'qwertyuiopasdfghjkl'])(
    'is not one that everybody tries: %s',
    (password) => expect(accepted(password)).toBe(false),
  );

  it.each([
    'aaaaaaaaaaaaaaaa',
    'abcabcabcabcabcabc',
    'abcdefghijklmnopqr',
    '1234567890123456',
    '9876543210987654',
  ])('is not a repetition or a run: %s', (password) => expect(accepted(password)).toBe(false));

  it.each(['architect@tarnbrook.example', 'architect architect1', 'Alpine Stream 12', 'Pinloom Ada Brook'])(
    'is not what is known of the account: %s',
    (password) => expect(accepted(password)).toBe(false),
  );

  it('may hold a known word among enough others', () => {
    expect(accepted('architect under a grey sky')).toBe(true);
  });
});

/**
 * Which passwords are accepted. NIST SP 800-63B-4 §3.1.1.2: alone, a password has at least 15 characters, counted as
 * Unicode code points; long ones and spaces are welcome; nothing is asked about kinds of characters; whole passwords
 * that are common or tell of the account are refused.
 */

export const PASSWORD_MIN = 15;
export const PASSWORD_MAX = 200;

/** Passwords of 15 characters and more that everybody tries: runs along the keyboard and set phrases. */
const common = new Set([
  'correcthorsebatterystaple',
  'iloveyouiloveyou',
  'letmeinletmein12',
  'passwordpassword',
  'passwordpassword1',
  'qwertyqwertyqwerty',
  'qwertyuiopasdfgh',
  'qwertyuiopasdfghjkl',
  'qwertyuiopasdfghjklzxcvbnm',
  'thisisapassword',
  'thisismypassword',
  'mysecretpassword',
  'trustno1trustno1',
  'welcomewelcome1',
  'changemechangeme',
  'administrator123',
  'administrator1234',
  '1q2w3e4r5t6y7u8i9o0p',
  'zaq12wsxzaq12wsx',
  'abcdefghijklmno',
  'abcdefghijklmnop',
  'abcdefghijklmnopqrstuvwxyz',
]);

export interface PasswordContext {
  email: string;
  name?: string;
  workspaceName?: string;
}

/** Null when the password is accepted, else a sentence that says what to do. */
export function passwordProblem(password: string, context: PasswordContext): string | null {
  const length = [...password].length;
  if (length < PASSWORD_MIN) {
    return `Use at least ${PASSWORD_MIN} characters; a short sentence of your own is easy to remember.`;
  }
  if (length > PASSWORD_MAX) return `Use at most ${PASSWORD_MAX} characters.`;
  const folded = fold(password);
  if (common.has(folded) || isRepetition(folded) || isRun(folded)) {
    return 'This password is among the first that are guessed. Choose one of your own.';
  }
  const words = [context.email, context.email.split('@')[0], context.name, context.workspaceName, 'pinloom'];
  // What is left without the words that anybody knows of the account has to stand by itself.
  const rest = words
    .map((word) => fold(word ?? ''))
    .filter((word) => word.length >= 4)
    .sort((a, b) => b.length - a.length)
    .reduce((text, word) => text.replaceAll(word, ''), folded);
  if (rest.length < 8) {
    return 'This password is mostly your name, address or workspace. Choose other words.';
  }
  return null;
}

const fold = (text: string) => text.normalize('NFKC').toLowerCase().replace(/\s+/g, '');

/** One piece of up to eight characters over and over. */
function isRepetition(text: string): boolean {
  for (let size = 1; size <= 8; size++) {
    if (
      text.length >= 2 * size &&
      text ===
        text
          .slice(0, size)
          .repeat(Math.ceil(text.length / size))
          .slice(0, text.length)
    ) {
      return true;
    }
  }
  return false;
}

/** Character codes that step by one all along, such as 123456789012345 but for the turn from 9 to 0. */
function isRun(text: string): boolean {
  const steps = [...text].slice(1).map((character, i) => character.charCodeAt(0) - text.charCodeAt(i));
  return [1, -1].some((step) => steps.every((s) => s === step || s === -9 * step));
}

/** How often the doors may be tried. NIST SP 800-63B asks for at most 100 failures in a row on one account. */
import type { Limit } from '../rate-limit';

const MINUTE = 60;
const HOUR = 3600;

/** From one address on one account: the person who mistypes. */
export const signInHere: Limit = {
  name: 'sign-in by account and address',
  attempts: 10,
  windowSeconds: 15 * MINUTE,
};
/** From anywhere on one account: many guessers. Generous, so that they cannot easily lock the owner out. */
export const signInAccount: Limit = { name: 'sign-in by account', attempts: 60, windowSeconds: HOUR };
/** From one address on any account: one password tried on many. */
export const signInAddress: Limit = { name: 'sign-in by address', attempts: 60, windowSeconds: 15 * MINUTE };

export const signUpAddress: Limit = { name: 'sign-up by address', attempts: 20, windowSeconds: HOUR };
export const resetAccount: Limit = { name: 'reset by account', attempts: 3, windowSeconds: HOUR };
export const resetAddress: Limit = { name: 'reset by address', attempts: 20, windowSeconds: HOUR };
/** Guesses at a link's token, or at the current password of a session left open. */
export const linkAddress: Limit = { name: 'link by address', attempts: 60, windowSeconds: 15 * MINUTE };
export const passwordChange: Limit = { name: 'password change', attempts: 10, windowSeconds: 15 * MINUTE };
/** Letters that one workspace makes us send. */
export const inviteWorkspace: Limit = { name: 'invitations by workspace', attempts: 50, windowSeconds: HOUR };
export const newWorkspace: Limit = { name: 'workspaces by account', attempts: 10, windowSeconds: HOUR };

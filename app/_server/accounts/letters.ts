/** The letters that accounts cause. Plain text: every reader shows it, and the link is seen whole. */
import type { Role } from '@/lib/roles';
import { roleSummaries } from '@/lib/roles';
import type { Letter } from '../mail';

const sign = '\n\nPinloom\n';
/** Names go into subjects: no line may be broken from inside. */
const oneLine = (text: string) => text.replace(/[\r\n\t]+/g, ' ').trim();

export const invitationLetter = (of: {
  to: string;
  inviterName: string;
  workspaceName: string;
  role: Role;
  link: string;
  validDays: number;
}): Letter => ({
  to: of.to,
  subject: oneLine(`${of.inviterName} invites you to ${of.workspaceName} on Pinloom`),
  text: `${oneLine(of.inviterName)} invites you to the workspace "${oneLine(of.workspaceName)}" as ${of.role} (${roleSummaries[of.role]}).

Accept within ${of.validDays} days:
${of.link}

If you did not expect this, ignore it: nothing happens without the link.${sign}`,
});

export const resetLetter = (of: { to: string; link: string; validMinutes: number }): Letter => ({
  to: of.to,
  subject: 'Choose a new password for Pinloom',
  text: `Somebody, probably you, asked for a new password for this address.

Choose one within ${of.validMinutes} minutes:
${of.link}

If it was not you, ignore this letter: your password stays as it is.${sign}`,
});

/** For the same request when the address has no account, so that its owner is not left waiting. */
export const noAccountLetter = (of: { to: string; signUpLink: string }): Letter => ({
  to: of.to,
  subject: 'Your request to Pinloom',
  text: `Somebody, probably you, asked for a new password for this address, but it has no account here.

Perhaps the account has another address. To make a new one:
${of.signUpLink}

If it was not you, ignore this letter.${sign}`,
});

export const passwordChangedLetter = (of: { to: string; resetLink: string }): Letter => ({
  to: of.to,
  subject: 'Your Pinloom password was changed',
  text: `The password of this account was just changed.

If it was not you, choose a new one at once:
${of.resetLink}${sign}`,
});

/** Answers a sign-up with an address that has an account; the screen says the same as for a new one. */
export const alreadyHereLetter = (of: { to: string; signInLink: string; resetLink: string }): Letter => ({
  to: of.to,
  subject: 'You already have a Pinloom account',
  text: `Somebody, probably you, tried to make an account with this address. There is one already.

Sign in: ${of.signInLink}
Forgotten the password: ${of.resetLink}

If it was not you, ignore this letter: nothing was changed.${sign}`,
});

export const confirmSignUpLetter = (of: { to: string; link: string; validHours: number }): Letter => ({
  to: of.to,
  subject: 'Confirm your address for Pinloom',
  text: `Finish making your Pinloom account within ${of.validHours} hours:
${of.link}

If it was not you, ignore this letter.${sign}`,
});

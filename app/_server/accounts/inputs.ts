/** The fields of the account forms. */
import { z } from 'zod';
import { roles } from '@/lib/roles';
import { PASSWORD_MAX } from './password-rule';

export const emailInput = z
  .string()
  .trim()
  .max(254)
  .toLowerCase()
  .pipe(z.email('Enter an e-mail address, such as name@example.org'));
export const personNameInput = z.string().trim().min(1, 'Enter your name').max(80);
export const workspaceNameInput = z.string().trim().min(1, 'Enter a name for the workspace').max(80);
/** Taken exactly as typed. Two UTF-16 units per code point at the most. */
export const passwordInput = z
  .string()
  .min(1, 'Enter the password')
  .max(2 * PASSWORD_MAX);
export const tokenInput = z.string().regex(/^[A-Za-z0-9_-]{43}$/, 'This link is not complete');
export const roleInput = z.enum(roles);

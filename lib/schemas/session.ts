import { z } from 'zod';
import { line } from './fields';

export const signInInput = z.object({
  email: z.email('Type the e-mail address of the account.').max(200),
  password: z.string().min(1, 'Type the password.').max(1000),
});

const newPassword = z
  .string()
  .min(10, 'The password needs 10 characters or more.')
  .refine(
    (text) => new TextEncoder().encode(text).length <= 72,
    'The password is longer than 72 bytes; take a shorter one.',
  );

export const changePasswordInput = z.object({
  current: z.string().min(1, 'Type the present password.').max(1000),
  next: newPassword,
});

export const setUpInput = z.object({
  organisation: line(120, 'Give the organisation a name.'),
  name: line(120, 'Give your name; it stands on what you sign.'),
  email: z.email('Type an e-mail address.').max(200),
  password: newPassword,
  onePersonShop: z.boolean().default(false),
});

import { randomUUID } from 'node:crypto';
import { eq, isNull, and } from 'drizzle-orm';
import { afterAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { sessions } from '../../db/schema';
import { hashPassword } from '../../lib/auth/passwords';
import { signIn } from '../../lib/auth/sign-in';
import { changePassword } from '../../lib/services/people/change-password';
import { setUpOrganisation } from '../../lib/services/people/set-up-organisation';
import { anOrganisation, PASSWORD } from '../support/factories';

afterAll(closeDatabase);

const address = () => `test ${randomUUID()}`;

describe('signing in', () => {
  it('opens a session for the right password, in any case of the e-mail', async () => {
    const { emailOf } = await anOrganisation();
    const email = emailOf('engineer').toUpperCase();
    const { who } = await signIn({ email, password: PASSWORD, address: address() });
    expect(who.roles).toEqual(['engineer']);
  });

  it('answers an unknown account and a wrong password alike', async () => {
    const { emailOf } = await anOrganisation();
    const wrong = signIn({ email: emailOf('engineer'), password: 'wrong', address: address() });
    const unknown = signIn({
      email: `nobody-${randomUUID()}@example.com`,
      password: 'wrong',
      address: address(),
    });
    const [first, second] = await Promise.allSettled([wrong, unknown]);
    expect(first).toMatchObject({ status: 'rejected', reason: { code: 'UNAUTHENTICATED' } });
    expect((first as PromiseRejectedResult).reason.message).toBe(
      (second as PromiseRejectedResult).reason.message,
    );
  });

  it('is limited per account, from whatever address', async () => {
    const { emailOf } = await anOrganisation();
    const attempt = (password: string) => signIn({ email: emailOf('admin'), password, address: address() });
    for (let i = 0; i < 10; i += 1)
      await expect(attempt('wrong')).rejects.toMatchObject({ code: 'UNAUTHENTICATED' });
    await expect(attempt(PASSWORD)).rejects.toMatchObject({ code: 'TOO_MANY' });
  });

  it('is limited per address, over whatever accounts', async () => {
    const one = address();
    const attempt = () => signIn({ email: `${randomUUID()}@example.com`, password: 'wrong', address: one });
    const codes: string[] = [];
    for (let i = 0; i < 62; i += 1)
      codes.push(
        await attempt().then(
          () => 'in',
          (error: { code: string }) => error.code,
        ),
      );
    expect(codes.at(-1)).toBe('TOO_MANY');
  });

  it('refuses a password over 72 bytes instead of cutting it', async () => {
    await expect(hashPassword('ä'.repeat(37))).rejects.toThrow('72 bytes');
    const { emailOf } = await anOrganisation();
    const long = PASSWORD + 'x'.repeat(80);
    await expect(
      signIn({ email: emailOf('engineer'), password: long, address: address() }),
    ).rejects.toMatchObject({
      code: 'UNAUTHENTICATED',
    });
  });

  it('ends every session of a person when the password changes', async () => {
    const { emailOf, scopes } = await anOrganisation();
    const { engineer } = scopes;
    for (let i = 0; i < 2; i += 1)
      await signIn({ email: emailOf('engineer'), password: PASSWORD, address: address() });
    const open = () =>
      database()
        .select()
        .from(sessions)
        .where(and(eq(sessions.personId, engineer.actor.id ?? ''), isNull(sessions.endedAt)));
    expect(await open()).toHaveLength(2);
    await changePassword(engineer, { current: PASSWORD, next: 'another password' });
    expect(await open()).toHaveLength(0);
    await signIn({ email: emailOf('engineer'), password: 'another password', address: address() });
  });

  it('refuses a first-run set-up once there are people', async () => {
    await anOrganisation();
    const input = { organisation: 'X', name: 'Y', email: 'y@example.com', password: 'a long password' };
    await expect(setUpOrganisation(input)).rejects.toMatchObject({ code: 'CONFLICT' });
  });
});

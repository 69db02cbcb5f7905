import { endSession } from '@/lib/auth/session';
import { endpoint } from '@/lib/http/endpoint';
import { changePassword } from '@/lib/services/people/change-password';

export const POST = endpoint({
  run: async ({ session: { scope }, input }) => {
    await changePassword(scope, input);
    await endSession();
    return { changed: true };
  },
});

import { endpoint } from '@/lib/http/endpoint';
import { createToken } from '@/lib/services/tokens/create-token';

export const POST = endpoint({
  status: 201,
  run: ({ session: { scope }, input }) => createToken(scope, input),
});

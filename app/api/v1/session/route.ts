import { endSession, sessionOf, startSession } from '@/lib/auth/session';
import { signIn } from '@/lib/auth/sign-in';
import { FettleError } from '@/lib/errors';
import { answering, jsonResponse, refuseForeignOrigin } from '@/lib/http/endpoint';
import { readBody } from '@/lib/http/read-json';
import { signInInput } from '@/lib/schemas/session';
import { parseInput } from '@/lib/services/parse-input';

/** The address a rate limit counts: the nearest proxy's word, or the loopback when there is none. */
function addressOf(request: Request): string {
  return request.headers.get('x-forwarded-for')?.split(',').at(-1)?.trim() || 'loopback';
}

export function POST(request: Request) {
  return answering(async () => {
    refuseForeignOrigin(request);
    const { json } = await readBody(request);
    const { email, password } = parseInput(signInInput, json);
    const { sessionId, who } = await signIn({ email, password, address: addressOf(request) });
    await startSession(sessionId);
    return jsonResponse(who);
  });
}

export function GET(request: Request) {
  return answering(async () => {
    const session = await sessionOf(request);
    if (!session) throw new FettleError('UNAUTHENTICATED', 'Nobody is signed in.');
    const { person, organisation, roles } = session;
    return jsonResponse({ person, organisation, roles });
  });
}

export function DELETE(request: Request) {
  return answering(async () => {
    refuseForeignOrigin(request);
    await endSession();
    return jsonResponse(null);
  });
}

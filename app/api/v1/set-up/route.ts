import { answering, jsonResponse, refuseForeignOrigin } from '@/lib/http/endpoint';
import { readBody } from '@/lib/http/read-json';
import { setUpOrganisation } from '@/lib/services/people/set-up-organisation';

/** First run only: refused as soon as anyone has an account. */
export function POST(request: Request) {
  return answering(async () => {
    refuseForeignOrigin(request);
    const { json } = await readBody(request);
    return jsonResponse(await setUpOrganisation(json), 201);
  });
}

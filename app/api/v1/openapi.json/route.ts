import { appUrl } from '@/lib/env';
import { openApiDocument } from '@/lib/http/openapi';

export const dynamic = 'force-dynamic';

export function GET() {
  return Response.json(openApiDocument(appUrl()));
}

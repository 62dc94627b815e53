import { env } from '@/lib/env';
import { openApiOf } from '@/lib/web/openapi';
import { routes } from '../routes';

export function GET(): Response {
  return Response.json(openApiOf(routes, { url: env().NEXTAUTH_URL, version: env().APP_VERSION }));
}

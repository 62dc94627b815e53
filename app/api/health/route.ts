import { checkHealth } from '@/lib/web/health';

export async function GET(): Promise<Response> {
  const health = await checkHealth();
  return Response.json(health, { status: health.ready ? 200 : 503, headers: { 'cache-control': 'no-store' } });
}

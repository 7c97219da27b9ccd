import { checkReady } from '@/lib/health/check-ready';
import { json } from '@/lib/http/route';

export const dynamic = 'force-dynamic';

export async function GET() {
  const readiness = await checkReady();
  return json(readiness, readiness.ready ? 200 : 503);
}

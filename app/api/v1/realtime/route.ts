import { personRoute } from '@/lib/http/route';
import { realtimeAddress } from '@/realtime/address';

export const GET = personRoute({}, async () => realtimeAddress());

import 'server-only';
import { realtimeEnv } from '@/lib/env/env';
import type { LiveConfig } from './live-connection';

/** Where browsers reach the realtime server. */
export function readLiveConfig(): LiveConfig {
  const env = realtimeEnv();
  return {
    key: env.PUSHER_KEY,
    host: env.PUSHER_PUBLIC_HOST,
    port: env.PUSHER_PUBLIC_PORT,
    tls: env.PUSHER_PUBLIC_TLS ?? env.PUSHER_TLS,
  };
}

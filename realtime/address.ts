import { realtimeEnv, siteEnv } from '@/lib/env/env';

/** Where a browser finds the realtime server; the key is public, the secret stays here. */
export function realtimeAddress(): { key: string; host: string; port: number; tls: boolean } {
  const e = realtimeEnv();
  const tls = e.PUSHER_PUBLIC_TLS ?? siteEnv().APP_URL.startsWith('https://');
  return { key: e.PUSHER_KEY, host: e.PUSHER_PUBLIC_HOST, port: e.PUSHER_PUBLIC_PORT, tls };
}

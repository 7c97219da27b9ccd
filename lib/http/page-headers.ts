import { randomBytes } from 'node:crypto';
import { commonEnv, realtimeEnv, siteEnv, storageEnv } from '@/lib/env/env';
import { contentSecurityPolicy } from './content-security-policy';

const always = {
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  // Addresses of invitations and resets hold tokens: no other host learns where somebody came from.
  'referrer-policy': 'same-origin',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), geolocation=(), payment=(), usb=(), browsing-topics=()',
};

/** 144 random bits, new for each answer. */
export const newNonce = () => randomBytes(18).toString('base64');

/** Where presigned addresses lead: the bucket is part of the path, or of the host. */
export function storeOrigin(): string {
  const e = storageEnv();
  const url = new URL(e.S3_PUBLIC_ENDPOINT);
  if (!e.S3_FORCE_PATH_STYLE) url.hostname = `${e.S3_BUCKET}.${url.hostname}`;
  return url.origin;
}

function realtimeOrigin(secure: boolean): string {
  const e = realtimeEnv();
  const scheme = (e.PUSHER_PUBLIC_TLS ?? secure) ? 'wss' : 'ws';
  return `${scheme}://${e.PUSHER_PUBLIC_HOST}:${e.PUSHER_PUBLIC_PORT}`;
}

/** Security headers of a page, with its policy. */
export function pageHeaders(nonce: string): Record<string, string> {
  const secure = siteEnv().APP_URL.startsWith('https://');
  const policy = contentSecurityPolicy({
    nonce,
    secure,
    storeOrigin: storeOrigin(),
    realtimeOrigin: realtimeOrigin(secure),
    development: commonEnv().NODE_ENV === 'development',
  });
  return { ...apiHeaders(), 'content-security-policy': policy };
}

/** Security headers of an answer that is not a page: nothing in it may run. */
export function apiHeaders(): Record<string, string> {
  const secure = siteEnv().APP_URL.startsWith('https://');
  return {
    ...always,
    'content-security-policy':
      "default-src 'none'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'",
    ...(secure ? { 'strict-transport-security': 'max-age=63072000; includeSubDomains' } : {}),
  };
}

/** Sends the reader on to a short-lived address in the store; the bytes never pass through this process. */
export const toStore = (location: string): Response =>
  new Response(null, {
    status: 307,
    headers: { location, 'cache-control': 'private, no-store', 'referrer-policy': 'no-referrer' },
  });

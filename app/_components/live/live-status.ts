/** Whether this page hears of changes at once, asks for them, or has no connection at all. */
export type LiveStatus = 'connecting' | 'live' | 'polling' | 'offline';

/** A page that is not live after this long starts to ask. */
export const patienceMs = 8_000;
/** The same for a page that was live and lost it; the socket's own silence has been waited for by then. */
export const patienceAfterLossMs = 3_000;
/** How often a page that is not live asks. */
export const pollMs = 15_000;
/** After a reconnect every open page fetches again; spreading them keeps a server restart from becoming a rush. */
export const jitterMs = 2_000;

export interface Signals {
  /** The browser says that there is a network. */
  online: boolean;
  /** The realtime server holds our subscription. */
  subscribed: boolean;
  /** the patience above has passed without a subscription. */
  waitedEnough: boolean;
}

export function liveStatusOf({ online, subscribed, waitedEnough }: Signals): LiveStatus {
  if (!online) return 'offline';
  if (subscribed) return 'live';
  return waitedEnough ? 'polling' : 'connecting';
}

import { ApiError } from '@/app/_components/api-client';

type Options = { signal: AbortSignal; tries: number; onProgress: (bytes: number) => void };

/** Puts one part to a presigned address; tries again with growing pauses. Returns the store's ETag. */
export async function sendPart(url: string, body: Blob, options: Options): Promise<string> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await putOnce(url, body, options);
    } catch (error) {
      if (options.signal.aborted || attempt >= options.tries) throw error;
      options.onProgress(0);
      await pause(Math.min(8000, 400 * 2 ** attempt) * (0.75 + Math.random() / 2), options.signal);
    }
  }
}

/** XMLHttpRequest, because fetch does not tell how much of a body has been sent. */
function putOnce(url: string, body: Blob, { signal, onProgress }: Options): Promise<string> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const abort = () => request.abort();
    signal.addEventListener('abort', abort, { once: true });
    request.upload.onprogress = (event) => onProgress(event.loaded);
    request.onloadend = () => {
      signal.removeEventListener('abort', abort);
      const etag = request.getResponseHeader('etag');
      if (request.status >= 200 && request.status < 300 && etag) resolve(etag);
      else reject(storeTrouble(request.status));
    };
    request.open('PUT', url);
    request.send(body);
  });
}

function storeTrouble(status: number): ApiError {
  const detail =
    status === 0
      ? 'The connection to the file store broke off. Parts that arrived whole are kept; press Resume to go on.'
      : `The file store answered ${status}. Parts that arrived whole are kept; press Resume to go on.`;
  return new ApiError(status, 'The file could not be sent', detail);
}

function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve, reject) => {
    const timer = setTimeout(resolve, ms);
    signal.addEventListener(
      'abort',
      () => {
        clearTimeout(timer);
        reject(new DOMException('stopped', 'AbortError'));
      },
      { once: true },
    );
  });
}

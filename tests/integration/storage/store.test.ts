import { buffer } from 'node:stream/consumers';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sha256 } from '@/lib/audit/canonical';
import { AppError } from '@/lib/errors/app-error';
import { MissingObject } from '@/lib/storage/guard-store';
import { derivativeKey, packKey, uploadKey } from '@/lib/storage/keys';
import { putStream } from '@/lib/storage/put-stream';
import { LengthMismatch, readObject } from '@/lib/storage/read-object';
import { store } from '@/lib/storage/store';
import { freshObjectStore } from '@/tests/support/database';
import type { ObjectStore } from '@/tests/support/object-store/start-object-store';

const workspaceId = '01890000-0000-7000-8000-000000000001';
let objects: ObjectStore;
let now = new Date();

beforeAll(async () => {
  objects = await freshObjectStore({ clock: () => now });
});
beforeEach(() => {
  objects.faults.clear();
  now = new Date();
});

const bytesOf = (length: number, fill = 7) => new Uint8Array(length).fill(fill);
const put = (url: string, body: Uint8Array) => fetch(url, { method: 'PUT', body: Buffer.from(body) });

describe('keys', () => {
  it('are made anew each time and say the area and the workspace', () => {
    expect(uploadKey(workspaceId)).toMatch(new RegExp(`^uploads/${workspaceId}/[0-9a-f-]{36}$`));
    expect(derivativeKey(workspaceId)).toMatch(/^derivatives\//);
    expect(packKey(workspaceId)).not.toBe(packKey(workspaceId));
  });
});

describe('an upload in parts', () => {
  const size = 5 * 1024 * 1024;

  it('takes parts of exactly the signed length, straight from a browser, and joins them in order', async () => {
    const key = uploadKey(workspaceId);
    const upload = await store().startMultipart(key, 'model/stl');
    const first = await store().presignPart(key, upload, 1, size);
    const second = await store().presignPart(key, upload, 2, 11);
    expect(new URL(first).searchParams.get('X-Amz-SignedHeaders')).toContain('content-length');
    expect(Number(new URL(first).searchParams.get('X-Amz-Expires'))).toBeLessThanOrEqual(900);

    expect((await put(second, bytesOf(12))).status).toBe(403);
    const [two, one] = [await put(second, bytesOf(11, 2)), await put(first, bytesOf(size, 1))];
    expect([one.status, two.status]).toEqual([200, 200]);
    const parts = [
      { number: 2, etag: two.headers.get('etag')! },
      { number: 1, etag: one.headers.get('etag')! },
    ];
    await store().completeMultipart(key, upload, parts);
    // A repeat after a lost answer is no error.
    await store().completeMultipart(key, upload, parts);
    expect(await store().head(key)).toMatchObject({ bytes: size + 11 });
    expect((await store().getBytes(key)).at(-1)).toBe(2);
    expect(objects.openUploads()).toHaveLength(0);
  });

  it('refuses an address after its quarter of an hour', async () => {
    const key = uploadKey(workspaceId);
    const upload = await store().startMultipart(key, 'model/stl');
    const url = await store().presignPart(key, upload, 1, 4);
    now = new Date(Date.now() + 901_000);
    expect((await put(url, bytesOf(4))).status).toBe(403);
    now = new Date();
    await store().abortMultipart(key, upload);
  });

  it('is given up without a trace, twice without complaint', async () => {
    const key = uploadKey(workspaceId);
    const upload = await store().startMultipart(key, 'model/stl');
    await put(await store().presignPart(key, upload, 1, 4), bytesOf(4));
    await store().abortMultipart(key, upload);
    await store().abortMultipart(key, upload);
    expect(objects.openUploads()).toHaveLength(0);
    expect(await store().head(key)).toBeNull();
    await expect(store().completeMultipart(key, upload, [])).rejects.toThrow();
  });
});

describe('an object', () => {
  it('is written once: the same again is no error, another is', async () => {
    const key = derivativeKey(workspaceId);
    await store().put(key, bytesOf(10), 'image/png');
    await store().put(key, bytesOf(10), 'image/png');
    await expect(store().put(key, bytesOf(11), 'image/png')).rejects.toThrow();
    expect(objects.versions(key)).toHaveLength(1);
  });

  it('is downloaded under the name that the reader shall see, for five minutes', async () => {
    const key = packKey(workspaceId);
    await store().put(key, bytesOf(10), 'application/octet-stream');
    const url = await store().presignGet(key, {
      fileName: 'Törtchen "B"\r\n/../x.zip',
      contentType: 'application/zip',
    });
    const answer = await fetch(url);
    expect(answer.status).toBe(200);
    expect(answer.headers.get('content-type')).toBe('application/zip');
    expect(answer.headers.get('content-disposition')).toBe(
      `attachment; filename="T_rtchen _B____.._x.zip"; filename*=UTF-8''T%C3%B6rtchen%20%22B%22___.._x.zip`,
    );
    now = new Date(Date.now() + 301_000);
    expect((await fetch(url)).status).toBe(403);
  });

  it('that is not there is said to be missing, never empty', async () => {
    const key = uploadKey(workspaceId);
    expect(await store().head(key)).toBeNull();
    await expect(store().getBytes(key)).rejects.toThrow(MissingObject);
    await expect(store().getStream(key)).rejects.toThrow(MissingObject);
  });
});

describe('a store that fails', () => {
  it('is asked again, and then called unavailable', async () => {
    const key = uploadKey(workspaceId);
    await store().put(key, bytesOf(10), 'model/stl');
    objects.faults.plant({ kind: 'unavailable', method: 'GET', times: 1 });
    expect(await store().getBytes(key)).toHaveLength(10);
    const fault = objects.faults.plant({ kind: 'unavailable', method: 'GET', times: 100 });
    const error = await store()
      .getBytes(key)
      .catch((caught) => caught);
    expect(error).toBeInstanceOf(AppError);
    expect(error).toMatchObject({ code: 'unavailable', reason: 'store-unavailable' });
    expect(fault.hits).toBeGreaterThan(1);
  });

  it('in the middle of a body gives no half file', async () => {
    const key = uploadKey(workspaceId);
    await store().put(key, bytesOf(1_000_000), 'model/stl');
    objects.faults.plant({ kind: 'truncated', method: 'GET' });
    await expect(readObject(store(), key, 1_000_000)).rejects.toMatchObject({ reason: 'store-unavailable' });
  });
});

describe('reading an object', () => {
  it('gives its bytes and their hash', async () => {
    const key = uploadKey(workspaceId);
    const bytes = bytesOf(123_456, 3);
    await store().put(key, bytes, 'model/stl');
    const read = await readObject(store(), key, bytes.length);
    expect(read.sha256).toBe(sha256(bytes));
    expect(Buffer.from(read.bytes).equals(Buffer.from(bytes))).toBe(true);
  });

  it.each([99, 101])('of 100 bytes where %i were promised is a mismatch', async (expected) => {
    const key = uploadKey(workspaceId);
    await store().put(key, bytesOf(100), 'model/stl');
    await expect(readObject(store(), key, expected)).rejects.toThrow(LengthMismatch);
  });

  it('stops when it is told to', async () => {
    const key = uploadKey(workspaceId);
    await store().put(key, bytesOf(100), 'model/stl');
    objects.faults.plant({ kind: 'hold', method: 'GET' });
    const stop = new AbortController();
    const reading = readObject(store(), key, 100, stop.signal);
    stop.abort();
    await expect(reading).rejects.toThrow();
  });
});

describe('writing a stream', () => {
  async function* chunks(count: number, length: number) {
    for (let n = 0; n < count; n++) yield bytesOf(length, n);
  }

  it.each([
    ['small', 3, 1000],
    ['of several parts', 21, 1_000_000],
  ])('%s makes one object with the right sum', async (_name, count, length) => {
    const key = packKey(workspaceId);
    const written = await putStream(store(), key, chunks(count, length), 'application/zip');
    expect(written.bytes).toBe(count * length);
    expect(sha256(await buffer(await store().getStream(key)))).toBe(written.sha256);
    expect(objects.openUploads()).toHaveLength(0);
  });

  it('that breaks leaves nothing behind', async () => {
    async function* breaking() {
      yield* chunks(12, 1_000_000);
      throw new Error('the source broke');
    }
    const key = packKey(workspaceId);
    await expect(putStream(store(), key, breaking(), 'application/zip')).rejects.toThrow('the source broke');
    expect(await store().head(key)).toBeNull();
    expect(objects.openUploads()).toHaveLength(0);
  });
});

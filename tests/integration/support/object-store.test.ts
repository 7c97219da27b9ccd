import { createHash } from 'node:crypto';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CopyObjectCommand,
  CreateMultipartUploadCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  ListPartsCommand,
  PutObjectCommand,
  S3Client,
  UploadPartCommand,
  type PutObjectCommandInput,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { afterEach, describe, expect, it } from 'vitest';
import { freshObjectStore } from '../../support/database';
import { smallestPart } from '../../support/object-store/multipart-operations';

let now = () => new Date();
const origin = 'http://127.0.0.1:3000';
const store = await freshObjectStore({ origins: [origin], clock: () => now() });
const Bucket = store.bucket;

function client(secretAccessKey = store.credentials.secretAccessKey, more: object = {}) {
  return new S3Client({
    endpoint: store.endpoint,
    region: 'us-east-1',
    forcePathStyle: true,
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 1,
    credentials: { accessKeyId: store.credentials.accessKeyId, secretAccessKey },
    ...more,
  });
}
const s3 = client();
const put = (Key: string, Body: string, more: Partial<PutObjectCommandInput> = {}) =>
  s3.send(new PutObjectCommand({ Bucket, Key, Body, ...more }));
const read = async (Key: string, more: object = {}) =>
  (await s3.send(new GetObjectCommand({ Bucket, Key, ...more }))).Body!.transformToString();
const codeOf = async (response: Response) => (await response.text()).match(/<Code>(.*?)<\/Code>/)?.[1];
const presignPut = (Key: string, input: Partial<PutObjectCommandInput>, signed: string[] = []) =>
  getSignedUrl(s3, new PutObjectCommand({ Bucket, Key, ...input }), {
    expiresIn: 60,
    signableHeaders: new Set(signed),
    unhoistableHeaders: new Set(signed),
  });

afterEach(() => {
  now = () => new Date();
  store.faults.clear();
});

describe('who may do what', () => {
  it('refuses a request without a signature', async () => {
    await put('secret.stl', 'bytes');
    const response = await fetch(`${store.endpoint}/${Bucket}/secret.stl`);
    expect([response.status, await codeOf(response)]).toEqual([403, 'AccessDenied']);
  });

  it('refuses a wrong secret, in headers and in an address', async () => {
    const other = client('not the secret');
    await expect(other.send(new PutObjectCommand({ Bucket, Key: 'a', Body: 'x' }))).rejects.toMatchObject({
      name: 'SignatureDoesNotMatch',
    });
    const url = await getSignedUrl(other, new GetObjectCommand({ Bucket, Key: 'secret.stl' }));
    expect(await codeOf(await fetch(url))).toBe('SignatureDoesNotMatch');
  });

  it('refuses an unknown key id', async () => {
    const stranger = client(undefined, { credentials: { accessKeyId: 'NOBODY', secretAccessKey: 'x' } });
    await expect(stranger.send(new GetObjectCommand({ Bucket, Key: 'a' }))).rejects.toMatchObject({
      name: 'InvalidAccessKeyId',
    });
  });

  it.each([
    ['another key', (url: string) => url.replace('/mine.stl', '/other.stl'), 'PUT'],
    ['another method', (url: string) => url, 'DELETE'],
    ['a longer life', (url: string) => url.replace('X-Amz-Expires=60', 'X-Amz-Expires=6000'), 'PUT'],
    ['another query', (url: string) => `${url}&versionId=1`, 'PUT'],
  ])('refuses a presigned PUT turned to %s', async (_, change, method) => {
    const url = await presignPut('mine.stl', {});
    const response = await fetch(change(url), { method, body: method === 'PUT' ? 'x' : undefined });
    expect([response.status, await codeOf(response)]).toEqual([403, 'SignatureDoesNotMatch']);
    expect(store.object('mine.stl')).toBeUndefined();
  });

  it('refuses an address after its time, and a request from a wrong clock', async () => {
    const url = await presignPut('late.stl', {});
    now = () => new Date(Date.now() + 61_000);
    expect(await codeOf(await fetch(url, { method: 'PUT', body: 'x' }))).toBe('AccessDenied');
    now = () => new Date(Date.now() + 16 * 60_000);
    await expect(put('late.stl', 'x')).rejects.toMatchObject({ name: 'RequestTimeTooSkewed' });
  });

  it('refuses x-amz headers that were not signed', async () => {
    const url = await presignPut('meta.stl', {});
    const headers = { 'x-amz-meta-owner': 'mallory' };
    expect((await fetch(url, { method: 'PUT', body: 'x', headers })).status).toBe(403);
  });
});

describe('signed lengths, types and conditions', () => {
  it('holds a signed length and type', async () => {
    const signed = ['content-length', 'content-type'];
    const url = await presignPut('sized.stl', { ContentLength: 4, ContentType: 'model/stl' }, signed);
    const send = (body: string, type: string) =>
      fetch(url, { method: 'PUT', body, headers: { 'content-type': type } });
    expect((await send('12345', 'model/stl')).status).toBe(403);
    expect((await send('1234', 'text/html')).status).toBe(403);
    expect((await send('1234', 'model/stl')).status).toBe(200);
    expect(store.object('sized.stl')?.headers).toEqual({ 'content-type': 'model/stl' });
  });

  it('never writes over an object under If-None-Match: *', async () => {
    await put('once.stl', 'first', { IfNoneMatch: '*' });
    await expect(put('once.stl', 'second', { IfNoneMatch: '*' })).rejects.toMatchObject({
      name: 'PreconditionFailed',
    });
    expect(await read('once.stl')).toBe('first');
  });

  it('demands the condition when it was signed into the address', async () => {
    const url = await presignPut('cond.stl', { IfNoneMatch: '*' }, ['if-none-match']);
    expect((await fetch(url, { method: 'PUT', body: 'x' })).status).toBe(403);
    const headers = { 'if-none-match': '*' };
    expect((await fetch(url, { method: 'PUT', body: 'x', headers })).status).toBe(200);
    expect((await fetch(url, { method: 'PUT', body: 'y', headers })).status).toBe(412);
  });

  it('refuses bytes that are not those of the digest in the address', async () => {
    // What the SDK does unless told otherwise: the address names the checksum of an empty body.
    const eager = client(undefined, { requestChecksumCalculation: 'WHEN_SUPPORTED' });
    const url = await getSignedUrl(eager, new PutObjectCommand({ Bucket, Key: 'crc.stl' }));
    expect(url).toContain('x-amz-checksum-crc32=');
    const response = await fetch(url, { method: 'PUT', body: 'bytes' });
    expect([response.status, await codeOf(response)]).toEqual([400, 'BadDigest']);
  });

  it('checks a SHA-256 that the sender names', async () => {
    const right = createHash('sha256').update('bytes').digest('base64');
    await put('sum.stl', 'bytes', { ChecksumSHA256: right });
    await expect(put('sum.stl', 'others', { ChecksumSHA256: right })).rejects.toMatchObject({
      name: 'BadDigest',
    });
  });
});

describe('objects', () => {
  it('keeps names of any script, types and metadata', async () => {
    const Key = 'w/ä ö/Schale (1)+’&.stl';
    await put(Key, 'bytes', { ContentType: 'model/stl', Metadata: { sha256: 'abc' } });
    const head = await s3.send(new HeadObjectCommand({ Bucket, Key }));
    expect(head).toMatchObject({ ContentLength: 5, ContentType: 'model/stl', Metadata: { sha256: 'abc' } });
    expect(head.ETag).toBe(`"${createHash('md5').update('bytes').digest('hex')}"`);
  });

  it('serves ranges', async () => {
    await put('range.bin', '0123456789');
    expect(await read('range.bin', { Range: 'bytes=2-4' })).toBe('234');
    expect(await read('range.bin', { Range: 'bytes=-3' })).toBe('789');
    expect(await read('range.bin', { Range: 'bytes=8-' })).toBe('89');
    await expect(read('range.bin', { Range: 'bytes=10-12' })).rejects.toMatchObject({ name: 'InvalidRange' });
  });

  it('sets the type and name that a presigned GET asks for', async () => {
    await put('page.html', '<script>');
    const url = await getSignedUrl(
      s3,
      new GetObjectCommand({
        Bucket,
        Key: 'page.html',
        ResponseContentDisposition: 'attachment; filename="page.html"',
        ResponseContentType: 'application/octet-stream',
      }),
    );
    const { headers } = await fetch(url);
    expect(headers.get('content-disposition')).toBe('attachment; filename="page.html"');
    expect(headers.get('content-type')).toBe('application/octet-stream');
  });

  it('keeps every version, also under a deletion', async () => {
    const first = await put('v.txt', 'one');
    await put('v.txt', 'two');
    await s3.send(new DeleteObjectCommand({ Bucket, Key: 'v.txt' }));
    await expect(read('v.txt')).rejects.toMatchObject({ name: 'NoSuchKey' });
    expect(await read('v.txt', { VersionId: first.VersionId })).toBe('one');
    expect(store.versions('v.txt').map(({ body }) => body?.toString() ?? null)).toEqual(['one', 'two', null]);
  });

  it('keeps a locked version until its retention ends', async () => {
    const until = new Date(Date.now() + 600_000);
    const { VersionId } = await put('lock.txt', 'x', {
      ObjectLockMode: 'COMPLIANCE',
      ObjectLockRetainUntilDate: until,
    });
    const remove = () => s3.send(new DeleteObjectCommand({ Bucket, Key: 'lock.txt', VersionId }));
    await expect(remove()).rejects.toMatchObject({ name: 'AccessDenied' });
    expect(await read('lock.txt')).toBe('x');
  });

  it('copies', async () => {
    await put('from.txt', 'copied', { ContentType: 'text/plain' });
    await s3.send(new CopyObjectCommand({ Bucket, Key: 'to.txt', CopySource: `${Bucket}/from.txt` }));
    expect(await read('to.txt')).toBe('copied');
  });

  it('lists by prefix, folds by delimiter, and pages', async () => {
    for (const name of ['a', 'b', 'sub/c', 'sub/d', 'z']) await put(`list/${name}`, name);
    const seen: string[] = [];
    let token: string | undefined;
    let pages = 0;
    do {
      const page: {
        Contents?: { Key?: string }[];
        CommonPrefixes?: { Prefix?: string }[];
        NextContinuationToken?: string;
      } = await s3.send(
        new ListObjectsV2Command({
          Bucket,
          Prefix: 'list/',
          Delimiter: '/',
          MaxKeys: 2,
          ContinuationToken: token,
        }),
      );
      seen.push(
        ...(page.Contents ?? []).map(({ Key }) => Key!),
        ...(page.CommonPrefixes ?? []).map((one) => one.Prefix!),
      );
      token = page.NextContinuationToken;
      pages += 1;
    } while (token);
    expect(pages).toBe(2);
    expect(seen.sort()).toEqual(['list/a', 'list/b', 'list/sub/', 'list/z']);
  });
});

describe('uploads in parts', () => {
  const begin = async (Key: string) =>
    (await s3.send(new CreateMultipartUploadCommand({ Bucket, Key, ContentType: 'model/stl' }))).UploadId!;
  const part = async (Key: string, UploadId: string, PartNumber: number, Body: Buffer) =>
    (await s3.send(new UploadPartCommand({ Bucket, Key, UploadId, PartNumber, Body }))).ETag!;
  const complete = (Key: string, UploadId: string, etags: [number, string][]) =>
    s3.send(
      new CompleteMultipartUploadCommand({
        Bucket,
        Key,
        UploadId,
        MultipartUpload: { Parts: etags.map(([PartNumber, ETag]) => ({ PartNumber, ETag })) },
      }),
    );

  it('puts parts together in order, whatever order they came in', async () => {
    const id = await begin('big.stl');
    const head = Buffer.alloc(smallestPart, 'a');
    const tail = Buffer.from('tail');
    const second = await part('big.stl', id, 2, tail);
    const first = await part('big.stl', id, 1, head);
    const listed = await s3.send(new ListPartsCommand({ Bucket, Key: 'big.stl', UploadId: id }));
    expect(listed.Parts?.map(({ PartNumber, Size, ETag }) => [PartNumber, Size, ETag])).toEqual([
      [1, smallestPart, first],
      [2, 4, second],
    ]);
    await complete('big.stl', id, [
      [1, first],
      [2, second],
    ]);
    expect(store.object('big.stl')?.body?.equals(Buffer.concat([head, tail]))).toBe(true);
    expect(store.object('big.stl')?.etag).toMatch(/^[0-9a-f]{32}-2$/);
    expect(store.openUploads()).toEqual([]);
  });

  it('refuses small, missing, changed and unsorted parts', async () => {
    const id = await begin('bad.stl');
    const first = await part('bad.stl', id, 1, Buffer.from('small'));
    const second = await part('bad.stl', id, 2, Buffer.from('last'));
    const attempt = (etags: [number, string][]) => complete('bad.stl', id, etags);
    await expect(attempt([[1, first], [2, second]])).rejects.toMatchObject({ name: 'EntityTooSmall' }); // prettier-ignore
    await expect(attempt([[2, second], [1, first]])).rejects.toMatchObject({ name: 'InvalidPartOrder' }); // prettier-ignore
    await expect(attempt([[3, first]])).rejects.toMatchObject({ name: 'InvalidPart' });
    await expect(attempt([[2, first]])).rejects.toMatchObject({ name: 'InvalidPart' });
    expect(store.object('bad.stl')).toBeUndefined();
  });

  it('gives an upload up, and knows it no more', async () => {
    const id = await begin('gone.stl');
    await part('gone.stl', id, 1, Buffer.from('x'));
    await s3.send(new AbortMultipartUploadCommand({ Bucket, Key: 'gone.stl', UploadId: id }));
    await expect(part('gone.stl', id, 2, Buffer.from('y'))).rejects.toMatchObject({ name: 'NoSuchUpload' });
    await expect(
      s3.send(new AbortMultipartUploadCommand({ Bucket, Key: 'gone.stl', UploadId: id })),
    ).rejects.toMatchObject({ name: 'NoSuchUpload' });
  });
});

describe('browsers', () => {
  it('lets the page of the product upload and read the ETag, and no other page', async () => {
    const ask = (from: string) =>
      fetch(`${store.endpoint}/${Bucket}/x`, {
        method: 'OPTIONS',
        headers: { origin: from, 'access-control-request-method': 'PUT' },
      });
    expect((await ask('http://elsewhere.example')).status).toBe(403);
    const allowed = await ask(origin);
    expect(allowed.status).toBe(200);
    expect(allowed.headers.get('access-control-allow-origin')).toBe(origin);
    const upload = await fetch(await presignPut('cors.stl', {}), {
      method: 'PUT',
      body: 'x',
      headers: { origin },
    });
    expect(upload.headers.get('access-control-expose-headers')).toBe('ETag');
  });
});

describe('faults', () => {
  it('answers 503 once, then works again', async () => {
    store.faults.plant({ kind: 'unavailable', method: 'PUT' });
    await expect(put('f.txt', 'x')).rejects.toMatchObject({ name: 'SlowDown' });
    await put('f.txt', 'x');
    expect(await read('f.txt')).toBe('x');
  });

  it('breaks the connection', async () => {
    const fault = store.faults.plant({ kind: 'reset', url: /reset\.txt/ });
    await expect(put('reset.txt', 'x')).rejects.toMatchObject({ code: 'ECONNRESET' });
    expect([fault.hits, store.object('reset.txt')]).toEqual([1, undefined]);
  });

  it('cuts an answer off half-way', async () => {
    await put('cut.txt', 'x'.repeat(100_000));
    store.faults.plant({ kind: 'truncated', method: 'GET' });
    await expect(read('cut.txt')).rejects.toThrow(/aborted|terminated|ECONNRESET/);
  });

  it('holds an answer until it is released', async () => {
    await put('hold.txt', 'held');
    const fault = store.faults.plant({ kind: 'hold', method: 'GET' });
    let answered = false;
    const reading = read('hold.txt').finally(() => (answered = true));
    await expect.poll(() => fault.hits).toBe(1);
    expect(answered).toBe(false);
    fault.release();
    expect(await reading).toBe('held');
  });
});

import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  GetObjectCommand,
  ListPartsCommand,
  PutObjectCommand,
  S3Client,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { afterAll, describe, expect, it } from 'vitest';
import { anyFreePort } from '@/docker/local/ports';
import { makeSecrets } from '@/docker/local/secrets';
import { bucket as Bucket, defineStore } from '@/docker/local/store';

const folder = mkdtempSync(path.join(tmpdir(), 'firstpull-store-'));
const { store: credentials } = makeSecrets();
const origin = 'http://127.0.0.1:3000';
const service = defineStore({
  folder: path.join(folder, 'store'),
  port: await anyFreePort(),
  credentials,
  origins: [origin],
  logFile: path.join(folder, 'store.log'),
});
await service.start();
afterAll(async () => {
  await service.stop();
  rmSync(folder, { recursive: true, force: true });
});

const client = (secretAccessKey = credentials.secretAccessKey) =>
  new S3Client({
    endpoint: service.url,
    region: 'us-east-1',
    forcePathStyle: true,
    requestChecksumCalculation: 'WHEN_REQUIRED',
    maxAttempts: 1,
    credentials: { accessKeyId: credentials.accessKeyId, secretAccessKey },
  });
const s3 = client();
const read = async (Key: string) =>
  (await s3.send(new GetObjectCommand({ Bucket, Key }))).Body!.transformToString();

describe('the local object store', () => {
  it('takes signed requests only', async () => {
    await s3.send(new PutObjectCommand({ Bucket, Key: 'w/ä (1).stl', Body: 'bytes' }));
    expect(await read('w/ä (1).stl')).toBe('bytes');
    expect((await fetch(`${service.url}/${Bucket}/w/%C3%A4%20%281%29.stl`)).status).toBe(403);
    const wrong = client('not the secret').send(new GetObjectCommand({ Bucket, Key: 'w/ä (1).stl' }));
    await expect(wrong).rejects.toMatchObject({ name: 'SignatureDoesNotMatch' });
  });

  it('takes an upload in parts by presigned addresses, from the page of the product', async () => {
    const Key = 'parts.stl';
    const { UploadId } = await s3.send(new CreateMultipartUploadCommand({ Bucket, Key }));
    const bodies = ['a'.repeat(5 * 1024 * 1024), 'tail'];
    const etags: string[] = [];
    for (const [index, body] of bodies.entries()) {
      const command = new UploadPartCommand({ Bucket, Key, UploadId, PartNumber: index + 1 });
      const response = await fetch(await getSignedUrl(s3, command), {
        method: 'PUT',
        body,
        headers: { origin },
      });
      expect(response.headers.get('access-control-expose-headers')).toContain('ETag');
      expect(response.headers.get('access-control-allow-origin')).toBe(origin);
      etags.push(response.headers.get('etag')!);
    }
    const listed = await s3.send(new ListPartsCommand({ Bucket, Key, UploadId }));
    expect(listed.Parts?.map(({ PartNumber, ETag, Size }) => [PartNumber, ETag, Size])).toEqual([
      [1, etags[0], bodies[0].length],
      [2, etags[1], 4],
    ]);
    const Parts = etags.map((ETag, index) => ({ ETag, PartNumber: index + 1 }));
    await s3.send(new CompleteMultipartUploadCommand({ Bucket, Key, UploadId, MultipartUpload: { Parts } }));
    expect(await read(Key)).toBe(bodies.join(''));
  });

  it('gives an upload up', async () => {
    const Key = 'gone.stl';
    const { UploadId } = await s3.send(new CreateMultipartUploadCommand({ Bucket, Key }));
    await s3.send(new UploadPartCommand({ Bucket, Key, UploadId, PartNumber: 1, Body: 'x' }));
    await s3.send(new AbortMultipartUploadCommand({ Bucket, Key, UploadId }));
    const list = s3.send(new ListPartsCommand({ Bucket, Key, UploadId }));
    await expect(list).rejects.toMatchObject({ name: 'NoSuchUpload' });
  });

  it('never writes over an object under If-None-Match: *', async () => {
    const once = (Body: string) =>
      s3.send(new PutObjectCommand({ Bucket, Key: 'once', Body, IfNoneMatch: '*' }));
    await once('first');
    await expect(once('second')).rejects.toMatchObject({ name: 'PreconditionFailed' });
    expect(await read('once')).toBe('first');
  });

  it('answers the preflight of the product’s page and of no other', async () => {
    const ask = (from: string) =>
      fetch(`${service.url}/${Bucket}/x`, {
        method: 'OPTIONS',
        headers: { origin: from, 'access-control-request-method': 'PUT' },
      });
    expect((await ask(origin)).status).toBe(200);
    expect((await ask('http://elsewhere.example')).status).toBe(403);
  });

  it('keeps its objects when it is started again after a crash', async () => {
    await s3.send(new PutObjectCommand({ Bucket, Key: 'kept', Body: 'kept' }));
    await service.crash('down');
    expect(service.pid()).toBeUndefined();
    await service.start();
    expect(await read('kept')).toBe('kept');
  });
});

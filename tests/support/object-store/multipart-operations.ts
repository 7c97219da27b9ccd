import { createHash, randomUUID } from 'node:crypto';
import { StoreError, tag, xmlAnswer, type Answer } from './answer';
import { checkDigests, md5, refuseIfThere, type Bucket } from './bucket';
import { keptHeaders, namedDigests, type Call } from './object-operations';

/** S3's smallest part, the last one excepted; Amazon S3 User Guide, "multipart upload limits". */
export const smallestPart = 5 * 1024 * 1024;

export function createUpload(bucket: Bucket, call: Call): Answer {
  const id = randomUUID().replaceAll('-', '');
  bucket.uploads.set(id, { id, key: call.key, headers: keptHeaders(call), parts: new Map() });
  const fields = [tag('Bucket', call.bucketName), tag('Key', call.key), tag('UploadId', id)];
  return xmlAnswer('InitiateMultipartUploadResult', fields.join(''));
}

export function uploadPart(bucket: Bucket, call: Call): Answer {
  const upload = bucket.upload(call.query.uploadId, call.key);
  const number = Number(call.query.partNumber);
  if (!Number.isInteger(number) || number < 1 || number > 10_000) {
    throw new StoreError(
      400,
      'InvalidArgument',
      'Part number must be an integer between 1 and 10000, inclusive.',
    );
  }
  checkDigests(call.body, namedDigests(call));
  const etag = md5(call.body);
  upload.parts.set(number, { etag, body: call.body });
  return { status: 200, headers: { etag: `"${etag}"` } };
}

export function completeUpload(bucket: Bucket, call: Call): Answer {
  const upload = bucket.upload(call.query.uploadId, call.key);
  refuseIfThere(bucket, call.key, call.headers['if-none-match']);
  const named = [...call.body.toString().matchAll(/<Part>([\s\S]*?)<\/Part>/g)].map(([, part]) => ({
    number: Number(part.match(/<PartNumber>(\d+)<\/PartNumber>/)?.[1]),
    etag: (part.match(/<ETag>(.*?)<\/ETag>/)?.[1] ?? '').replace(/&quot;|&#34;|"/g, ''),
  }));
  if (named.length === 0) throw new StoreError(400, 'MalformedXML', 'The parts are missing.');
  if (named.some(({ number }, index) => index > 0 && number <= named[index - 1].number)) {
    throw new StoreError(400, 'InvalidPartOrder', 'The list of parts was not in ascending order.');
  }
  named.forEach(({ number, etag }, index) => {
    const part = upload.parts.get(number);
    if (part?.etag !== etag) {
      throw new StoreError(
        400,
        'InvalidPart',
        `Part ${number} was not uploaded, or its entity tag is another one.`,
      );
    }
    if (index < named.length - 1 && part.body.length < smallestPart) {
      throw new StoreError(400, 'EntityTooSmall', `Part ${number} is smaller than the minimum allowed size.`);
    }
  });
  const parts = named.map(({ number }) => upload.parts.get(number)!);
  const digest = createHash('md5');
  parts.forEach(({ etag }) => digest.update(Buffer.from(etag, 'hex')));
  const etag = `${digest.digest('hex')}-${parts.length}`;
  const version = bucket.add(
    call.key,
    Buffer.concat(parts.map(({ body }) => body)),
    etag,
    upload.headers,
    call.now,
  );
  bucket.uploads.delete(upload.id);
  const fields = [tag('Bucket', call.bucketName), tag('Key', call.key), tag('ETag', `"${etag}"`)];
  const answer = xmlAnswer('CompleteMultipartUploadResult', fields.join(''));
  return { ...answer, headers: { ...answer.headers, 'x-amz-version-id': version.versionId } };
}

export function abortUpload(bucket: Bucket, call: Call): Answer {
  bucket.uploads.delete(bucket.upload(call.query.uploadId, call.key).id);
  return { status: 204 };
}

export function listParts(bucket: Bucket, call: Call): Answer {
  const upload = bucket.upload(call.query.uploadId, call.key);
  const after = Number(call.query['part-number-marker'] ?? 0);
  const limit = Math.min(Number(call.query['max-parts'] ?? 1000), 1000);
  const all = [...upload.parts].sort(([a], [b]) => a - b).filter(([number]) => number > after);
  const page = all.slice(0, limit);
  const xml = page.map(
    ([number, { etag, body }]) =>
      `<Part>${tag('PartNumber', number)}${tag('ETag', `"${etag}"`)}${tag('Size', body.length)}</Part>`,
  );
  return xmlAnswer(
    'ListPartsResult',
    [
      tag('Bucket', call.bucketName),
      tag('Key', call.key),
      tag('UploadId', upload.id),
      tag('IsTruncated', all.length > page.length),
      tag('NextPartNumberMarker', page.at(-1)?.[0] ?? after),
      ...xml,
    ].join(''),
  );
}

export function listUploads(bucket: Bucket, call: Call): Answer {
  const prefix = call.query.prefix ?? '';
  const xml = [...bucket.uploads.values()]
    .filter(({ key }) => key.startsWith(prefix))
    .map(({ id, key }) => `<Upload>${tag('Key', key)}${tag('UploadId', id)}</Upload>`);
  return xmlAnswer('ListMultipartUploadsResult', `${tag('IsTruncated', false)}${xml.join('')}`);
}

import { decode } from '@/docker/local/store/verify-signature';
import { StoreError, tag, xmlAnswer, type Answer } from './answer';
import { checkDigests, md5, refuseIfThere, type Bucket, type StoredVersion } from './bucket';

export interface Call {
  method: string;
  bucketName: string;
  key: string;
  query: Record<string, string>;
  headers: Record<string, string | undefined>;
  body: Buffer;
  now: Date;
}

const kept =
  /^(content-type|content-disposition|content-encoding|cache-control|x-amz-meta-.*|x-amz-object-lock-.*)$/;

export function keptHeaders({ headers, query }: Call): Record<string, string> {
  const all = Object.entries({ ...headers, ...query }).filter(
    ([name, value]) => kept.test(name) && value !== undefined,
  );
  return Object.fromEntries(all) as Record<string, string>;
}

/** Digests may stand in headers or, in a presigned address, in its query. */
export const namedDigests = ({ headers, query }: Call) => ({ ...query, ...headers });

export function putObject(bucket: Bucket, call: Call): Answer {
  refuseIfThere(bucket, call.key, call.headers['if-none-match']);
  const source = call.headers['x-amz-copy-source'];
  if (source) return copyObject(bucket, call, source);
  checkDigests(call.body, namedDigests(call));
  const version = bucket.add(call.key, call.body, md5(call.body), keptHeaders(call), call.now);
  return { status: 200, headers: { etag: `"${version.etag}"`, 'x-amz-version-id': version.versionId } };
}

function copyObject(bucket: Bucket, call: Call, source: string): Answer {
  const [path, search = ''] = source.replace(/^\//, '').split('?versionId=');
  const from = bucket.find(decode(path.slice(path.indexOf('/') + 1)), search || undefined);
  const replaced = call.headers['x-amz-metadata-directive'] === 'REPLACE';
  const copy = bucket.add(
    call.key,
    from.body,
    from.etag,
    replaced ? keptHeaders(call) : from.headers,
    call.now,
  );
  const answer = xmlAnswer(
    'CopyObjectResult',
    tag('ETag', `"${copy.etag}"`) + tag('LastModified', copy.at.toISOString()),
  );
  return { ...answer, headers: { ...answer.headers, 'x-amz-version-id': copy.versionId } };
}

export function getObject(bucket: Bucket, call: Call): Answer {
  const version = bucket.find(call.key, call.query.versionId);
  const body = version.body!;
  const headers = describe(version, call);
  const ifMatch = call.headers['if-match'];
  if (ifMatch && ifMatch !== '*' && ifMatch !== `"${version.etag}"`) {
    throw new StoreError(
      412,
      'PreconditionFailed',
      'At least one of the preconditions you specified did not hold.',
    );
  }
  if (call.headers['if-none-match'] === `"${version.etag}"`) return { status: 304, headers };
  const range = call.headers.range?.match(/^bytes=(\d*)-(\d*)$/);
  if (!range || (range[1] === '' && range[2] === '')) {
    return { status: 200, headers: { ...headers, 'content-length': String(body.length) }, body };
  }
  const first = range[1] === '' ? Math.max(0, body.length - Number(range[2])) : Number(range[1]);
  const last =
    range[1] !== '' && range[2] !== '' ? Math.min(Number(range[2]), body.length - 1) : body.length - 1;
  if (first > last) throw new StoreError(416, 'InvalidRange', 'The requested range is not satisfiable.');
  const part = body.subarray(first, last + 1);
  const length = {
    'content-length': String(part.length),
    'content-range': `bytes ${first}-${last}/${body.length}`,
  };
  return { status: 206, headers: { ...headers, ...length }, body: part };
}

function describe(version: StoredVersion, { query }: Call): Record<string, string> {
  const overrides = Object.entries(query)
    .filter(([name]) => name.startsWith('response-'))
    .map(([name, value]) => [name.slice('response-'.length), value]);
  return {
    'content-type': 'binary/octet-stream',
    'accept-ranges': 'bytes',
    ...version.headers,
    etag: `"${version.etag}"`,
    'last-modified': version.at.toUTCString(),
    'x-amz-version-id': version.versionId,
    ...Object.fromEntries(overrides),
  };
}

export function deleteObject(bucket: Bucket, call: Call): Answer {
  if (call.query.versionId) {
    bucket.removeVersion(call.key, call.query.versionId, call.now);
    return { status: 204 };
  }
  if (!bucket.versions.has(call.key)) return { status: 204 };
  const marker = bucket.add(call.key, null, '', {}, call.now);
  return { status: 204, headers: { 'x-amz-delete-marker': 'true', 'x-amz-version-id': marker.versionId } };
}

/** ListObjectsV2 with prefix, delimiter, start-after and pages. */
export function listObjects(bucket: Bucket, { bucketName, query }: Call): Answer {
  const prefix = query.prefix ?? '';
  const delimiter = query.delimiter ?? '';
  const limit = Math.min(Number(query['max-keys'] ?? 1000), 1000);
  const after = query['continuation-token']
    ? Buffer.from(query['continuation-token'], 'base64url').toString()
    : (query['start-after'] ?? '');
  const name = query['encoding-type'] === 'url' ? encodeURIComponent : (text: string) => text;

  const entries: { last: string; xml: string }[] = [];
  const prefixes = new Set<string>();
  for (const key of bucket.keys().filter((one) => one.startsWith(prefix) && one > after)) {
    const cut = delimiter ? key.indexOf(delimiter, prefix.length) : -1;
    if (cut < 0) {
      const { etag, at, body } = bucket.latest(key)!;
      const fields = [tag('Key', name(key)), tag('LastModified', at.toISOString()), tag('ETag', `"${etag}"`)];
      entries.push({ last: key, xml: `<Contents>${fields.join('')}${tag('Size', body!.length)}</Contents>` });
      continue;
    }
    const common = key.slice(0, cut + delimiter.length);
    const last = entries.at(-1);
    if (prefixes.has(common)) last!.last = key;
    else entries.push({ last: key, xml: `<CommonPrefixes>${tag('Prefix', name(common))}</CommonPrefixes>` });
    prefixes.add(common);
  }
  const page = entries.slice(0, limit);
  const more = entries.length > page.length;
  const token = more ? Buffer.from(page.at(-1)?.last ?? after).toString('base64url') : '';
  return xmlAnswer(
    'ListBucketResult',
    [
      tag('Name', bucketName),
      tag('Prefix', name(prefix)),
      tag('KeyCount', page.length),
      tag('MaxKeys', limit),
      tag('IsTruncated', more),
      more ? tag('NextContinuationToken', token) : '',
      ...page.map(({ xml }) => xml),
    ].join(''),
  );
}

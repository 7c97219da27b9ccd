import { createHash, createHmac, timingSafeEqual } from 'node:crypto';

// AWS Signature Version 4 for S3, checked from the server's side. Source: Amazon S3 API Reference,
// "Authenticating Requests (AWS Signature Version 4)": authorization header and query parameters.

export interface StoreCredentials {
  accessKeyId: string;
  secretAccessKey: string;
}

export interface SignedRequest {
  method: string;
  /** Path and query exactly as they came. */
  url: string;
  headers: Record<string, string | string[] | undefined>;
}

export interface Refusal {
  status: number;
  code: string;
  message: string;
}

const algorithm = 'AWS4-HMAC-SHA256';
const skewMs = 15 * 60 * 1000;
const refuse = (code: string, message: string, status = 403): Refusal => ({ status, code, message });

/**
 * Checks who signed a request, when, and that nothing signed was changed.
 * @returns null when the signature holds, otherwise what to answer
 */
export function verifySignature(
  request: SignedRequest,
  credentials: StoreCredentials,
  now: Date,
): Refusal | null {
  const [rawPath, rawQuery = ''] = splitOnce(request.url, '?');
  const query = parseQuery(rawQuery);
  const authorization = header(request, 'authorization');
  const presigned = query.some(([name]) => name === 'X-Amz-Algorithm');
  if (!authorization && !presigned) return refuse('AccessDenied', 'The request is not signed.');
  if (authorization && presigned)
    return refuse('InvalidArgument', 'Only one way of signing is allowed.', 400);

  const claim = presigned ? claimOfQuery(query) : claimOfHeader(request, authorization!);
  if (!claim)
    return refuse('AuthorizationHeaderMalformed', 'The signature’s parts are missing or malformed.', 400);
  const [keyId, day, region, service, end] = claim.scope;
  if (keyId !== credentials.accessKeyId)
    return refuse('InvalidAccessKeyId', 'The access key is not known here.');
  if (service !== 's3' || end !== 'aws4_request' || !claim.date.startsWith(day)) {
    return refuse(
      'AuthorizationHeaderMalformed',
      'The scope is not that of a request to S3 on that day.',
      400,
    );
  }
  const late = lateness(claim, presigned, now);
  if (late) return late;
  const unsigned = unsignedHeader(request, claim.signedHeaders);
  if (unsigned) return refuse('AccessDenied', `The header ${unsigned} was sent but not signed.`);

  const canonical = [
    request.method,
    canonicalPath(rawPath),
    canonicalQuery(query.filter(([name]) => name !== 'X-Amz-Signature')),
    ...claim.signedHeaders.map((name) => `${name}:${canonicalHeader(request, name)}`),
    '',
    claim.signedHeaders.join(';'),
    presigned ? 'UNSIGNED-PAYLOAD' : (header(request, 'x-amz-content-sha256') ?? ''),
  ].join('\n');
  const scope = [day, region, service, end].join('/');
  const toSign = [algorithm, claim.date, scope, sha256(canonical)].join('\n');
  const key = [day, region, service, end].reduce<Buffer | string>(hmac, `AWS4${credentials.secretAccessKey}`);
  const expected = hmac(key, toSign).toString('hex');
  return sameText(expected, claim.signature)
    ? null
    : refuse('SignatureDoesNotMatch', 'The signature does not match the request as it arrived.');
}

interface Claim {
  scope: string[];
  date: string;
  expires: number | null;
  signedHeaders: string[];
  signature: string;
}

function claimOfQuery(query: [string, string][]): Claim | null {
  const get = (name: string) => query.find(([one]) => one === name)?.[1] ?? '';
  if (get('X-Amz-Algorithm') !== algorithm) return null;
  return wellFormed({
    scope: get('X-Amz-Credential').split('/'),
    date: get('X-Amz-Date'),
    expires: /^\d+$/.test(get('X-Amz-Expires')) ? Number(get('X-Amz-Expires')) : Number.NaN,
    signedHeaders: get('X-Amz-SignedHeaders').split(';'),
    signature: get('X-Amz-Signature'),
  });
}

function claimOfHeader(request: SignedRequest, authorization: string): Claim | null {
  const parts = authorization.match(
    /^AWS4-HMAC-SHA256 Credential=([^,]+),\s*SignedHeaders=([^,]+),\s*Signature=(\w+)$/,
  );
  if (!parts || !header(request, 'x-amz-content-sha256')) return null;
  return wellFormed({
    scope: parts[1].split('/'),
    date: header(request, 'x-amz-date') ?? '',
    expires: null,
    signedHeaders: parts[2].split(';'),
    signature: parts[3],
  });
}

function wellFormed(claim: Claim): Claim | null {
  const { scope, date, expires, signedHeaders, signature } = claim;
  const holds =
    scope.length === 5 &&
    /^\d{8}T\d{6}Z$/.test(date) &&
    (expires === null || (expires >= 1 && expires <= 604_800)) &&
    signedHeaders.includes('host') &&
    /^[0-9a-f]{64}$/.test(signature);
  return holds ? claim : null;
}

function lateness(claim: Claim, presigned: boolean, now: Date): Refusal | null {
  const [, year, month, day, hour, minute, second] = claim.date.match(
    /^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/,
  )!;
  const signedAt = Date.UTC(
    Number(year),
    Number(month) - 1,
    Number(day),
    Number(hour),
    Number(minute),
    Number(second),
  );
  const age = now.getTime() - signedAt;
  if (presigned && age > claim.expires! * 1000) return refuse('AccessDenied', 'Request has expired');
  if (-age > skewMs || (!presigned && age > skewMs)) {
    return refuse('RequestTimeTooSkewed', 'The request’s time is too far from the server’s.');
  }
  return null;
}

/** Headers that change what a request does must be signed; S3 answers "HeadersNotSigned" otherwise. */
function unsignedHeader(request: SignedRequest, signedHeaders: string[]): string | undefined {
  return Object.keys(request.headers).find(
    (name) => (name.startsWith('x-amz-') || name === 'content-md5') && !signedHeaders.includes(name),
  );
}

function header(request: SignedRequest, name: string): string | undefined {
  const value = request.headers[name];
  return Array.isArray(value) ? value.join(',') : value;
}

const canonicalHeader = (request: SignedRequest, name: string) =>
  (header(request, name) ?? '').trim().replace(/ +/g, ' ');

function canonicalPath(path: string): string {
  return path
    .split('/')
    .map((segment) => encode(decode(segment)))
    .join('/');
}

function canonicalQuery(query: [string, string][]): string {
  return query
    .map(([name, value]) => [encode(name), encode(value)])
    .sort(([a, x], [b, y]) => (a === b ? compare(x, y) : compare(a, b)))
    .map((pair) => pair.join('='))
    .join('&');
}

export function parseQuery(raw: string): [string, string][] {
  return raw
    .split('&')
    .filter(Boolean)
    .map((pair) => splitOnce(pair, '=').map(decode) as [string, string])
    .map(([name, value = '']) => [name, value]);
}

export function decode(text: string): string {
  try {
    return decodeURIComponent(text);
  } catch {
    return text;
  }
}

const encode = (text: string) =>
  encodeURIComponent(text).replace(/[!'()*]/g, (char) => `%${char.charCodeAt(0).toString(16).toUpperCase()}`);
const compare = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0);
const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
const hmac = (key: Buffer | string, text: string) => createHmac('sha256', key).update(text).digest();

export function splitOnce(text: string, separator: string): string[] {
  const at = text.indexOf(separator);
  return at < 0 ? [text] : [text.slice(0, at), text.slice(at + separator.length)];
}

function sameText(a: string, b: string): boolean {
  const [left, right] = [Buffer.from(a), Buffer.from(b)];
  return left.length === right.length && timingSafeEqual(left, right);
}

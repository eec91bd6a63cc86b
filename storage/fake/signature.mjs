import { createHash, createHmac, timingSafeEqual } from 'node:crypto';

/**
 * AWS Signature Version 4 as the server sees it, for requests signed in the header and for presigned addresses.
 * https://docs.aws.amazon.com/AmazonS3/latest/API/sig-v4-authenticating-requests.html
 */

const algorithm = 'AWS4-HMAC-SHA256';
const longestPresignSeconds = 7 * 24 * 3600;
const allowedSkewMs = 15 * 60_000;

/** @param {string} text */
const encode = (text) => encodeURIComponent(text).replace(/[!'()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`);
/** @param {string | Buffer} key @param {string} text */
const hmac = (key, text) => createHmac('sha256', key).update(text).digest();
/** @param {string} text */
const sha256 = (text) => createHash('sha256').update(text).digest('hex');

/** @typedef {{ code: string, message: string }} Refusal */
/**
 * @typedef {object} Claim what a request says about who signed it
 * @property {boolean} presigned
 * @property {string} credential
 * @property {string[]} signedHeaders
 * @property {string} signature
 * @property {string} date
 * @property {string} payload
 * @property {number} [expiresSeconds]
 */

/** @param {string} code @param {string} message @returns {Refusal} */
const refuse = (code, message) => ({ code, message });
const denied = (/** @type {string} */ message) => refuse('AccessDenied', message);

/** @param {string} query @returns {[string, string][]} */
function decodeQuery(query) {
  return query
    .split('&')
    .filter((pair) => pair !== '')
    .map((pair) => {
      const at = pair.indexOf('=');
      const name = at < 0 ? pair : pair.slice(0, at);
      return [decodeURIComponent(name), at < 0 ? '' : decodeURIComponent(pair.slice(at + 1))];
    });
}

/**
 * @param {import('node:http').IncomingMessage} request
 * @param {[string, string][]} query
 * @returns {Claim | Refusal}
 */
function readClaim(request, query) {
  const fromQuery = new Map(query);
  const header = request.headers.authorization;
  if (fromQuery.has('X-Amz-Algorithm')) {
    if (header !== undefined) return refuse('InvalidArgument', 'Only one way of signing is allowed.');
    if (fromQuery.get('X-Amz-Algorithm') !== algorithm) return refuse('AuthorizationQueryParametersError', `X-Amz-Algorithm must be ${algorithm}.`);
    return {
      presigned: true,
      credential: fromQuery.get('X-Amz-Credential') ?? '',
      signedHeaders: (fromQuery.get('X-Amz-SignedHeaders') ?? '').split(';'),
      signature: fromQuery.get('X-Amz-Signature') ?? '',
      date: fromQuery.get('X-Amz-Date') ?? '',
      payload: fromQuery.get('X-Amz-Content-Sha256') ?? 'UNSIGNED-PAYLOAD',
      expiresSeconds: Number(fromQuery.get('X-Amz-Expires') ?? Number.NaN),
    };
  }
  const match = /^AWS4-HMAC-SHA256 Credential=([^,\s]+),\s*SignedHeaders=([^,\s]+),\s*Signature=([0-9a-f]{64})$/.exec(header ?? '');
  if (match === null) return denied('The request is not signed.');
  const payload = request.headers['x-amz-content-sha256'];
  if (typeof payload !== 'string') return refuse('InvalidRequest', 'The header x-amz-content-sha256 is missing.');
  const date = request.headers['x-amz-date'];
  const [, credential = '', signed = '', signature = ''] = match;
  return { presigned: false, credential, signedHeaders: signed.split(';'), signature, date: typeof date === 'string' ? date : '', payload };
}

/** @param {string} text `20250131T120000Z` @returns {number} milliseconds, NaN when it is no such date */
function parseDate(text) {
  const match = /^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/.exec(text);
  return match === null ? Number.NaN : Date.parse(`${match[1]}-${match[2]}-${match[3]}T${match[4]}:${match[5]}:${match[6]}Z`);
}

/** @param {Claim} claim @param {number} nowMs @returns {Refusal | undefined} */
function checkTime(claim, nowMs) {
  const signedAt = parseDate(claim.date);
  if (Number.isNaN(signedAt)) return denied('The date of the signature is missing or malformed.');
  if (claim.expiresSeconds === undefined) {
    return Math.abs(nowMs - signedAt) > allowedSkewMs ? refuse('RequestTimeTooSkewed', 'The difference between the request time and the server time is too large.') : undefined;
  }
  if (!(claim.expiresSeconds >= 1 && claim.expiresSeconds <= longestPresignSeconds)) return refuse('AuthorizationQueryParametersError', 'X-Amz-Expires must be between 1 and 604800 seconds.');
  if (signedAt > nowMs + allowedSkewMs) return denied('The request is not valid yet.');
  return nowMs > signedAt + claim.expiresSeconds * 1000 ? denied('Request has expired.') : undefined;
}

/** Headers that say something about the operation must be under the signature, or a stranger could add them. */
/** @param {import('node:http').IncomingMessage} request @param {Claim} claim @returns {Refusal | undefined} */
function checkSignedHeaders(request, claim) {
  const signed = new Set(claim.signedHeaders);
  const mustBeSigned = ['host', ...Object.keys(request.headers).filter((name) => name.startsWith('x-amz-'))];
  if (!claim.presigned && request.headers['content-md5'] !== undefined) mustBeSigned.push('content-md5');
  const missing = mustBeSigned.filter((name) => !signed.has(name));
  return missing.length > 0 ? denied(`There were headers present in the request which were not signed: ${missing.join(', ')}.`) : undefined;
}

/** @param {import('node:http').IncomingMessage} request @param {string} pathname @param {[string, string][]} query @param {Claim} claim */
function computeCanonicalRequest(request, pathname, query, claim) {
  const canonicalQuery = query
    .filter(([name]) => name !== 'X-Amz-Signature')
    .map(([name, value]) => [encode(name), encode(value)])
    .sort(([a = '', x = ''], [b = '', y = '']) => (a === b ? (x < y ? -1 : Number(x > y)) : a < b ? -1 : 1))
    .map((pair) => pair.join('='))
    .join('&');
  const headers = claim.signedHeaders.map((name) => {
    const value = request.headers[name];
    return `${name}:${(Array.isArray(value) ? value.join(',') : (value ?? '')).trim().replace(/ +/g, ' ')}\n`;
  });
  const canonicalPath = pathname.split('/').map((segment) => encode(decodeURIComponent(segment))).join('/');
  return [request.method, canonicalPath, canonicalQuery, headers.join(''), claim.signedHeaders.join(';'), claim.payload].join('\n');
}

/**
 * Checks who signed a request, and over what.
 * @param {import('node:http').IncomingMessage} request
 * @param {{ accessKeyId: string, secretAccessKey: string, region: string }} key
 * @param {number} [nowMs]
 * @returns {Refusal | { payload: string }} the S3 error to answer with, or the declared hash of the body
 */
export function checkSignature(request, key, nowMs = Date.now()) {
  const address = request.url ?? '/';
  const mark = address.indexOf('?');
  const pathname = mark < 0 ? address : address.slice(0, mark);
  const queryText = mark < 0 ? '' : address.slice(mark + 1);
  let query;
  try {
    query = decodeQuery(queryText);
    decodeURIComponent(pathname);
  } catch {
    return refuse('InvalidURI', 'The address is not properly encoded.');
  }
  const claim = readClaim(request, query);
  if ('code' in claim) return claim;
  const [accessKeyId, day = '', region = '', service = '', end, ...more] = claim.credential.split('/');
  if (accessKeyId !== key.accessKeyId) return refuse('InvalidAccessKeyId', 'The access key does not exist.');
  if (more.length > 0 || end !== 'aws4_request' || service !== 's3' || region !== key.region || day !== claim.date.slice(0, 8)) {
    return refuse('AuthorizationHeaderMalformed', `The credential must be for the service s3 in the region ${key.region} on the day of the signature.`);
  }
  const fault = checkTime(claim, nowMs) ?? checkSignedHeaders(request, claim);
  if (fault !== undefined) return fault;
  const scope = `${day}/${region}/${service}/aws4_request`;
  const signingKey = hmac(hmac(hmac(hmac(`AWS4${key.secretAccessKey}`, day), region), service), 'aws4_request');
  const expected = hmac(signingKey, [algorithm, claim.date, scope, sha256(computeCanonicalRequest(request, pathname, query, claim))].join('\n'));
  const given = Buffer.from(claim.signature, 'hex');
  if (given.length !== expected.length || !timingSafeEqual(given, expected)) return refuse('SignatureDoesNotMatch', 'The signature does not match the request.');
  return { payload: claim.payload };
}

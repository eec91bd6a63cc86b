/** @typedef {import('s3rver').FakeContext} FakeContext */

/**
 * Cross-origin answers for the listed origins only; s3rver's own preflight would answer any origin with `*`.
 * @param {FakeContext} ctx
 * @param {ReadonlySet<string>} allowedOrigins
 * @returns {boolean} true when the answer is complete
 */
export function answerCors(ctx, allowedOrigins) {
  const origin = ctx.get('origin');
  const allowed = allowedOrigins.has(origin);
  ctx.set('vary', 'Origin, Access-Control-Request-Headers, Access-Control-Request-Method');
  if (allowed) {
    ctx.set('access-control-allow-origin', origin);
    ctx.set('access-control-expose-headers', 'ETag');
  }
  if (ctx.method !== 'OPTIONS') return false;
  const method = ctx.get('access-control-request-method');
  if (!allowed || !['GET', 'PUT', 'HEAD'].includes(method)) {
    ctx.status = 403;
    ctx.body = { Error: { Code: 'AccessForbidden', Message: 'This CORS request is not allowed.' } };
    return true;
  }
  ctx.set('access-control-allow-methods', 'GET, PUT, HEAD');
  const headers = ctx.get('access-control-request-headers');
  if (headers !== '') ctx.set('access-control-allow-headers', headers);
  ctx.set('access-control-max-age', '3000');
  ctx.status = 204;
  return true;
}

import { describe, expect, it } from 'vitest';
import { parseLinkToken } from './link-token';

describe('token of a link', () => {
  it('is read from the fragment', () => {
    expect(parseLinkToken('#token=AbCdEfGhIjKlMnOpQrSt_-')).toEqual({ token: 'AbCdEfGhIjKlMnOpQrSt_-' });
  });
  it('a page opened without a link says where it is opened from', () => {
    expect(parseLinkToken('').problem).toContain('link in a mail');
  });
  it('a link that was cut by a mail program says so', () => {
    expect(parseLinkToken('#token=AbCdEf').problem).toContain('not complete');
  });
});

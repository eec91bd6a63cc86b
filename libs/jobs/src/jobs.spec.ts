import { linkToken } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { deriveLinkToken, hashToken, parseJobPayload, UnknownJobError } from './index';

const id = '0b8f4b5e-6f0e-4c39-9a3e-3f6a0f0b7c11';

describe('jobs', () => {
  it('a payload that is not as agreed is refused by name', () => {
    expect(() => parseJobPayload('measurement.run', { runId: id })).toThrow(UnknownJobError);
    expect(parseJobPayload('measurement.run', { organisationId: id, runId: id, later: 1 })).toEqual({ organisationId: id, runId: id });
  });
});

describe('the token of a mailed link', () => {
  const secret = 'ab'.repeat(32);
  it('is what the contract takes, the same each time, and another for another row, kind or secret', () => {
    const token = deriveLinkToken(secret, 'invitation', id);
    expect(linkToken.parse(token)).toBe(token);
    expect(deriveLinkToken(secret, 'invitation', id)).toBe(token);
    expect(deriveLinkToken(secret, 'password-reset', id)).not.toBe(token);
    expect(deriveLinkToken('cd'.repeat(32), 'invitation', id)).not.toBe(token);
    expect(hashToken(token)).toHaveLength(32);
  });
});

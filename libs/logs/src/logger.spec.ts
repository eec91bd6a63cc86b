import { describe, expect, it } from 'vitest';
import { createLogger } from './index';

function write(error: Error): Record<string, unknown> {
  const lines: string[] = [];
  createLogger('test', 'info', { write: (line) => void lines.push(line) }).error({ err: error }, 'failed');
  return JSON.parse(lines.join('')) as Record<string, unknown>;
}

describe('the log', () => {
  it('leaves out the parameters of a query that failed, and what PostgreSQL tells of the row', () => {
    const cause = Object.assign(new Error('duplicate key value violates unique constraint "users_email_key"'), {
      code: '23505',
      detail: 'Key (email)=(ines@halyard.example) already exists.',
    });
    const line = JSON.stringify(write(new Error('Failed query: insert into users\nparams: ines@halyard.example', { cause })));
    expect(line).toContain('users_email_key');
    expect(line).toContain('23505');
    expect(line).not.toContain('ines@halyard.example');
  });
  it('says what an error is and where it came from', () => {
    const { err } = write(new TypeError('no such thing'));
    expect(err).toMatchObject({ type: 'TypeError', message: 'no such thing', stack: expect.stringContaining('logger.spec.ts') as unknown });
  });
});

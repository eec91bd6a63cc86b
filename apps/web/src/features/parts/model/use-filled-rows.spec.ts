import { describe, expect, it } from 'vitest';
import { growFilled } from './use-filled-rows';

describe('growFilled', () => {
  it('begins at the first row in the page and goes down', () => {
    expect(growFilled({ first: 0, last: -1 }, { first: 40, last: 60 }, 6)).toEqual({ first: 40, last: 45 });
  });
  it('keeps what is filled and fills below before above', () => {
    expect(growFilled({ first: 10, last: 20 }, { first: 6, last: 24 }, 6)).toEqual({ first: 8, last: 24 });
  });
  it('drops what has left the page', () => {
    expect(growFilled({ first: 0, last: 30 }, { first: 25, last: 55 }, 6)).toEqual({ first: 25, last: 36 });
    expect(growFilled({ first: 0, last: 30 }, { first: 100, last: 130 }, 6)).toEqual({ first: 100, last: 105 });
  });
  it('ends when every row in the page is filled', () => {
    expect(growFilled({ first: 5, last: 9 }, { first: 5, last: 9 }, 6)).toEqual({ first: 5, last: 9 });
    expect(growFilled({ first: 0, last: -1 }, { first: 0, last: -1 }, 6)).toEqual({ first: 0, last: -1 });
  });
});

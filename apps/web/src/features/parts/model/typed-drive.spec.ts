import { describe, expect, it } from 'vitest';
import { readDrive, writeDrive } from './typed-drive';

describe('a typed drive', () => {
  it('takes bare numbers as r/min and seconds', () => {
    const { drive } = readDrive({ speed: '300', time: '.5' });
    expect(drive?.speedRadPerS).toBeCloseTo(31.41592653589793, 12);
    expect(drive?.timeS).toBe(0.5);
  });
  it('takes other units where they are written', () => {
    expect(readDrive({ speed: '20 rad/s', time: '200 ms' }).drive).toEqual({ speedRadPerS: 20, timeS: 0.2 });
  });
  it('is none while both are empty, and not one while only one is', () => {
    expect(readDrive({ speed: '', time: ' ' })).toEqual({ drive: null });
    expect(readDrive({ speed: '300', time: '' }).drive).toBeUndefined();
  });
  it('of no time or of impossible speed is refused', () => {
    expect(readDrive({ speed: '300', time: '0' }).timeError).toContain('greater than 0');
    expect(readDrive({ speed: '300', time: '1e-9' }).timeError).toContain('microsecond');
    expect(readDrive({ speed: '1e9', time: '1' }).speedError).toContain('faster than anything turns');
  });
  it('is written as it was typed', () => {
    const typed = { speed: '1500', time: '0.4' };
    const { drive } = readDrive(typed);
    expect(writeDrive(drive ?? null)).toEqual(typed);
  });
});

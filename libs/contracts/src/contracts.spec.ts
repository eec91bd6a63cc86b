import { describe, expect, it } from 'vitest';
import { asMade, axis, changeSettingRequest, createUploadRequest, emailAddress, linkToken, newPassword, setting, shellDensity } from './index';

describe('contracts', () => {
  it('an e-mail address is trimmed and lowered, so that one person is not two', () => {
    expect(emailAddress.parse('  Ines.Marsh@Halyard.Example ')).toBe('ines.marsh@halyard.example');
    expect(emailAddress.safeParse('ines marsh').success).toBe(false);
  });
  it('a direction of zero length is no axis', () => {
    const typed = (direction: number[]) => axis.safeParse({ kind: 'typed', pointM: [0, 0, 0], direction }).success;
    expect(typed([0, 0, 0])).toBe(false);
    expect(typed([0, -2, 0])).toBe(true);
    expect(typed([Number.NaN, 0, 1])).toBe(false);
    expect(typed([Number.POSITIVE_INFINITY, 0, 1])).toBe(false);
  });
  it('a change of setting needs the version it was made on', () => {
    expect(changeSettingRequest.safeParse({ densityKgM3: 2700 }).success).toBe(false);
    expect(changeSettingRequest.safeParse({ version: 1, densityKgM3: 0 }).success).toBe(false);
    expect(changeSettingRequest.parse({ version: 1, densityKgM3: null })).toEqual({ version: 1, densityKgM3: null });
  });
  it('an upload of a fraction of a byte, or of less than nothing, is refused', () => {
    expect(createUploadRequest.safeParse({ fileName: 'a.stl', sizeBytes: 1.5 }).success).toBe(false);
    expect(createUploadRequest.safeParse({ fileName: 'a.stl', sizeBytes: -1 }).success).toBe(false);
  });
  it('a link token is 22 characters of base64url: 128 bits', () => {
    expect(linkToken.safeParse('A'.repeat(22)).success).toBe(true);
    expect(linkToken.safeParse('A'.repeat(21)).success).toBe(false);
  });
  it('a new password has at least 12 characters', () => {
    expect(newPassword.safeParse('elevenchars').success).toBe(false);
    expect(newPassword.safeParse('twelve chars').success).toBe(true);
  });
  it('a setting from before tolerances and densities of shells reads as it was stored', () => {
    const stored = { lengthUnit: 'mm', densityKgM3: 2700, densitySpreadKgM3: null, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null };
    expect(setting.parse(stored)).toEqual(stored);
    const made = { ...stored, asMade: { kind: 'offset', spreadM: 1e-4 }, shellDensities: [{ shell: 2, densityKgM3: null }] };
    expect(setting.parse(made)).toEqual(made);
  });
  it('a tolerance is of scale or along the normal, not negative and not absurd', () => {
    expect(asMade.safeParse({ kind: 'scale', spread: 0.003 }).success).toBe(true);
    expect(asMade.safeParse({ kind: 'scale', spread: -0.003 }).success).toBe(false);
    expect(asMade.safeParse({ kind: 'scale', spread: 3 }).success).toBe(false);
    expect(asMade.safeParse({ kind: 'offset', spread: 0.003 }).success).toBe(false);
    expect(shellDensity.safeParse({ shell: 200, densityKgM3: 1 }).success).toBe(false);
    expect(shellDensity.safeParse({ shell: 0, densityKgM3: 0 }).success).toBe(false);
  });
});

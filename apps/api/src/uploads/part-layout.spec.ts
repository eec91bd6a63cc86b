import { describe, expect, it } from 'vitest';
import { countParts, layOutParts, sizeOfPart } from './part-layout';

describe('the parts of an upload', () => {
  it.each([0, 1, 8_388_607, 8_388_608, 8_388_609, 1e9, 83_886_080_000, 83_886_080_001, 5e12])('of %d bytes add up, are at most 10,000, and none but the last is under 5 MiB', (sizeBytes) => {
    const { partSizeBytes, partCount } = layOutParts(sizeBytes);
    expect(partCount).toBe(countParts(sizeBytes, partSizeBytes));
    expect(partCount).toBeLessThanOrEqual(10_000);
    expect(partSizeBytes).toBeGreaterThanOrEqual(5 * 1024 * 1024);
    const last = sizeOfPart(sizeBytes, partSizeBytes, partCount);
    expect((partCount - 1) * partSizeBytes + last).toBe(sizeBytes);
    expect(last).toBeGreaterThanOrEqual(sizeBytes === 0 ? 0 : 1);
    expect(last).toBeLessThanOrEqual(partSizeBytes);
  });
});

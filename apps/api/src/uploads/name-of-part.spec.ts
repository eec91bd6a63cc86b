import { describe, expect, it } from 'vitest';
import { nameOfPart } from './name-of-part';

describe('the first name of a part', () => {
  it.each([
    ['Drum flange.stl', 'Drum flange'],
    ['C:\\parts\\drum.STL', 'drum'],
    ['../../etc/passwd', 'passwd'],
    ['bracket', 'bracket'],
    ['.stl', 'Unnamed part'],
    ['drum\u202Elts.stl', 'drumlts'],
    ['line\nbreak\u0000.stl', 'linebreak'],
    [`${'x'.repeat(300)}.stl`, `${'x'.repeat(159)}…${'x'.repeat(36)}`],
    ['pawl.OBJ.gz', 'pawl'],
    ['pawl.3MF', 'pawl'],
    ['pawl.ply.gz', 'pawl'],
    ['pawl.glb', 'pawl'],
    ['pawl.stl.old', 'pawl.stl.old'],
  ])('of %j is %j', (fileName, name) => {
    expect(nameOfPart(fileName)).toBe(name);
  });
});

import { describe, expect, it } from 'vitest';
import { readCommandLine, UsageError, type Command } from './command-line';

const read = (...words: string[]): Command => {
  const command = readCommandLine(words);
  if (command === 'help') throw new Error('Help was asked for.');
  return command;
};

describe('the command line', () => {
  it('takes files, a unit, a density with its unit, an axis and a format, in any order', () => {
    expect(read('a.stl', '--density', '2.7g/cm3', 'b', '--unit', 'inch', '--axis', '2', '--format', 'csv', '--quick')).toEqual({
      paths: ['a.stl', 'b'],
      lengthUnit: 'inch',
      densityKgM3: 2700,
      axis: { kind: 'principal', number: 2 },
      format: 'csv',
      quick: true,
    });
  });
  it('asks for nothing but a file: the axis is z, the output a table', () => {
    expect(read('a.stl')).toEqual({ paths: ['a.stl'], lengthUnit: null, densityKgM3: null, axis: { kind: 'mesh', along: 'z' }, format: 'table', quick: false });
  });
  it('takes a direction and a point as an axis', () => {
    expect(read('a.stl', '--axis', '0,0,2@10,-5.5,0').axis).toEqual({ kind: 'typed', direction: [0, 0, 2], point: [10, -5.5, 0] });
  });
  it('says how to call it', () => {
    expect(readCommandLine(['--help'])).toBe('help');
    expect(readCommandLine(['-h', 'a.stl'])).toBe('help');
  });
  it.each([
    [[], 'Name the files'],
    [['a.stl', '--density', '2.7'], '--density 2.7:'],
    [['a.stl', '--density', '2.7 parsec'], '--density 2.7 parsec:'],
    [['a.stl', '--density', '0 kg/m3'], 'A density is at least'],
    [['a.stl', '--unit', 'furlong'], '"furlong" is no unit'],
    [['a.stl', '--axis', 'w'], '--axis w:'],
    [['a.stl', '--axis', '0,0,1'], '--axis 0,0,1:'],
    [['a.stl', '--axis', '0,0,0@1,2,3'], 'the direction needs'],
    [['a.stl', '--axis', '0,0,0x10@1,2,3'], '--axis 0,0,0x10@1,2,3:'],
    [['a.stl', '--axis', '0,0,1@1,2'], '--axis 0,0,1@1,2:'],
    [['a.stl', '--format', 'xml'], '"xml" is no format'],
    [['a.stl', '--fast'], '--fast'],
  ])('refuses %j in words', (words, said) => {
    expect(() => readCommandLine(words)).toThrow(UsageError);
    expect(() => readCommandLine(words)).toThrow(said);
  });
});

import { createHash } from 'node:crypto';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { statementRecord, type StatementRecord } from '@masswright/contracts';
import { writeAsciiStl, writeBinaryStl } from '@masswright/geometry';
import { parse } from 'csv-parse/sync';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readCommandLine, UsageError } from './command-line';
import { run } from './run';

/** A block from the origin, its facets looking outwards. */
function makeBlock(a: number, b: number, c: number): number[] {
  const corner = (n: number): number[] => [n & 1 ? a : 0, n & 2 ? b : 0, n & 4 ? c : 0];
  const quads = [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]];
  return quads.flatMap(([p = 0, q = 0, r = 0, s = 0]) => [p, q, r, p, r, s].flatMap(corner));
}

let folder = '';
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'cli-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const put = (name: string, bytes: Uint8Array | string): string => {
  const file = path.join(folder, name);
  mkdirSync(path.dirname(file), { recursive: true });
  writeFileSync(file, bytes);
  return file;
};

async function measure(...words: string[]): Promise<{ code: number; output: string }> {
  const command = readCommandLine(words);
  if (command === 'help') throw new Error('Help was asked for.');
  let output = '';
  const code = await run(command, (text) => (output += text), { show: () => undefined, clear: () => undefined });
  return { code, output };
}

const recordsOf = (output: string): unknown[] => output.trimEnd().split('\n').map((line) => JSON.parse(line) as unknown);

describe('measuring from the command line', () => {
  it('gives the record of a block of aluminium, as the handbook has it', async () => {
    const bytes = writeBinaryStl(makeBlock(20, 30, 40));
    const file = put('block.stl', bytes);
    const { code, output } = await measure(file, '--unit', 'mm', '--density', '2.7 g/cm3', '--axis', '0,0,1@0,0,0', '--format', 'json');
    expect(code).toBe(0);
    const record = statementRecord.parse(recordsOf(output)[0]);
    const mass = 2700 * 24e-6;
    expect(record.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
    expect(record.massKg).toBeCloseTo(mass, 15);
    expect(record.centreOfMassM?.map((metres) => Number(metres.toFixed(12)))).toEqual([0.01, 0.015, 0.02]);
    // m (b² + c²) / 12 and so on; about an edge along z: m (a² + b²) / 3.
    expect((record.inertiaAtCentreOfMassKgM2?.xx ?? NaN) / ((mass * (0.03 ** 2 + 0.04 ** 2)) / 12)).toBeCloseTo(1, 12);
    expect((record.aboutAxis?.inertiaKgM2 ?? NaN) / ((mass * (0.02 ** 2 + 0.03 ** 2)) / 3)).toBeCloseTo(1, 12);
    expect(record.soundness).toMatchObject({ closed: true, defensible: true, shells: 1 });
  });

  it('goes on after a file that can’t be measured, says why, and ends with 2', async () => {
    put('parts/a.stl', writeBinaryStl(makeBlock(1, 2, 3)));
    put('parts/b.stl', 'solid nothing\nendsolid nothing\n');
    put('parts/deeper/c.STL', writeAsciiStl(makeBlock(2, 2, 2)));
    put('parts/notes.txt', 'no mesh');
    const { code, output } = await measure(path.join(folder, 'parts'), '--unit', 'cm', '--density', '1 g/cm3', '--format', 'json');
    expect(code).toBe(2);
    const records = recordsOf(output) as { file: string; massKg?: number; error?: { code: string } }[];
    expect(records.map(({ file, massKg, error }) => [path.relative(folder, file), massKg === undefined ? error?.code : Number(massKg.toPrecision(12))])).toEqual([
      ['parts/a.stl', 0.006],
      ['parts/b.stl', 'facets-none'],
      ['parts/deeper/c.STL', 0.008],
    ]);
  });

  it('has no figures for an open mesh, which is no failure', async () => {
    const open = put('open.stl', writeBinaryStl(makeBlock(1, 2, 3).slice(9)));
    for (const quick of [[], ['--quick']]) {
      const { code, output } = await measure(open, '--unit', 'mm', '--density', '1 g/cm3', '--format', 'json', ...quick);
      expect(code).toBe(0);
      expect(recordsOf(output)[0]).toMatchObject({ massKg: null, volumeM3: null, soundness: { defensible: false, closed: quick.length > 0 ? null : false, shells: quick.length > 0 ? null : 1 } });
    }
  });

  it('gives the same figures quickly, and null for what was not examined', async () => {
    const file = put('block.stl', writeBinaryStl(makeBlock(20, 30, 40)));
    const words = [file, '--unit', 'mm', '--density', '2.7 g/cm3', '--format', 'json'];
    const [whole, quick] = [await measure(...words), await measure(...words, '--quick')].map(({ output }) => recordsOf(output)[0] as StatementRecord);
    expect(quick?.inertiaAtCentreOfMassKgM2).toEqual(whole?.inertiaAtCentreOfMassKgM2);
    expect(quick?.massKg).toBe(whole?.massKg);
    expect(quick?.soundness).toMatchObject({ closed: true, oriented: true, shells: null, degenerateFacets: null, selfIntersections: null });
  });

  it('asks for the unit where neither the person nor the file says it', async () => {
    const { code, output } = await measure(put('block.stl', writeBinaryStl(makeBlock(1, 1, 1))), '--format', 'json');
    expect(code).toBe(2);
    expect(recordsOf(output)[0]).toMatchObject({ error: { code: 'unit-not-stated' } });
  });

  it('writes a table whose names hold units, point, axes and sign, safe for spreadsheets', async () => {
    put('=cmd.stl', writeBinaryStl(makeBlock(20, 30, 40)));
    const { output } = await measure(folder, '--unit', 'mm', '--density', '2.7 g/cm3', '--format', 'csv');
    const [row] = parse<Record<string, string>>(output, { columns: true });
    expect(Number(row?.['mass_kg'])).toBeCloseTo(0.0648, 15);
    expect(Object.keys(row ?? {})).toContain('inertia_xy_equal_to_minus_integral_of_xy_dm_kg_m2_about_centre_of_mass_axes_of_mesh_frame');
    expect(row?.['file']?.endsWith('=cmd.stl')).toBe(true);
    const before = process.cwd();
    process.chdir(folder);
    const named = await measure('=cmd.stl', '--unit', 'mm', '--format', 'csv').finally(() => process.chdir(before));
    expect(parse<Record<string, string>>(named.output, { columns: true })[0]?.['file']).toBe("'=cmd.stl");
  });

  it('says what the columns of the aligned table are, and the reasons of failures below it', async () => {
    put('block.stl', writeBinaryStl(makeBlock(20, 30, 40)));
    put('empty.stl', '');
    const { code, output } = await measure(folder, '--unit', 'mm', '--density', '2.7 g/cm3');
    expect(code).toBe(2);
    expect(output).toMatch(/^file +facets +mesh +volume cm³ +mass kg/);
    expect(output).toMatch(/block\.stl +12 +closed +24\.0000 +0\.0648000 /);
    expect(output).toContain('an off-diagonal element there is -∫xy dm');
    expect(output).toMatch(/empty\.stl: The file/);
  });

  it('refuses a path that is not there, and a folder without meshes, before anything is measured', async () => {
    await expect(measure(path.join(folder, 'none.stl'))).rejects.toThrow(UsageError);
    await expect(measure(folder)).rejects.toThrow('There is no mesh file');
  });
});

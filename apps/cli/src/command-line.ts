import { parseArgs } from 'node:util';
import type { Vector3 } from '@masswright/contracts';
import { densityKgM3 as densityRange } from '@masswright/contracts';
import { lengthUnits, parseQuantity, type LengthUnit } from '@masswright/units';

/** About which axis: through the centre of mass along one of the mesh frame or a principal one, or through a point, in the mesh's unit. */
export type AskedAxis = { kind: 'mesh'; along: 'x' | 'y' | 'z' } | { kind: 'principal'; number: 1 | 2 | 3 } | { kind: 'typed'; direction: Vector3; point: Vector3 };

export interface Command {
  paths: string[];
  /** Null: of each file its own, where it states one. */
  lengthUnit: LengthUnit | null;
  densityKgM3: number | null;
  axis: AskedAxis;
  format: 'table' | 'json' | 'csv';
  /** Integrals and closedness only. */
  quick: boolean;
}

/** What is wrong with a command, in words that say what to write. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

export const usage = `Mass properties of triangle meshes.

  npm run -s measure -- <files or folders> --unit mm --density 2.7g/cm3

  --unit      micron, mm, cm, m, inch or foot: what one unit of the meshes is; may be left out for files that state theirs
  --density   with its unit, as in 2.7g/cm3 or 7850kg/m3; without it there is volume and no mass
  --axis      x, y or z through the centre of mass (z unless said), 1, 2 or 3 for a principal axis,
              or "x,y,z@px,py,pz": a direction and a point on the axis, in the unit of the mesh
  --format    table, json (a record a line) or csv
  --quick     integrals and whether the mesh is closed, in one reading; nothing else is examined

Exit code 0; 2 where a file could not be measured (its line says why, the others go on); 1 where the command can't be understood.`;

/** @throws UsageError */
export function readCommandLine(words: readonly string[]): Command | 'help' {
  const { values, positionals } = parse(words);
  if (values.help) return 'help';
  if (positionals.length === 0) throw new UsageError('Name the files or folders to be measured.');
  return {
    paths: positionals,
    lengthUnit: values.unit === undefined ? null : readUnit(values.unit),
    densityKgM3: values.density === undefined ? null : readDensity(values.density),
    axis: readAxis(values.axis ?? 'z'),
    format: readFormat(values.format ?? 'table'),
    quick: values.quick ?? false,
  };
}

function parse(words: readonly string[]) {
  try {
    return parseArgs({
      args: [...words],
      allowPositionals: true,
      options: {
        unit: { type: 'string' },
        density: { type: 'string' },
        axis: { type: 'string' },
        format: { type: 'string' },
        quick: { type: 'boolean' },
        help: { type: 'boolean', short: 'h' },
      },
    });
  } catch (error) {
    throw new UsageError(error instanceof Error ? error.message : 'The command can’t be read.', { cause: error });
  }
}

function readUnit(text: string): LengthUnit {
  const known = lengthUnits.find((unit) => unit === text);
  if (known === undefined) throw new UsageError(`"${text}" is no unit of a mesh; write ${lengthUnits.slice(0, -1).join(', ')} or ${lengthUnits.at(-1)}.`);
  return known;
}

function readDensity(text: string): number {
  const read = parseQuantity(text, 'density');
  if ('error' in read) throw new UsageError(`--density ${text}: ${read.error}`);
  const checked = densityRange.safeParse(read.value);
  if (!checked.success) throw new UsageError(`--density ${text}: ${checked.error.issues[0]?.message ?? 'This is no density.'}`);
  return checked.data;
}

function readAxis(text: string): AskedAxis {
  if (text === 'x' || text === 'y' || text === 'z') return { kind: 'mesh', along: text };
  if (text === '1' || text === '2' || text === '3') return { kind: 'principal', number: Number(text) as 1 | 2 | 3 };
  const [direction, point] = text.split('@').map(readVector);
  if (direction === undefined || point === undefined || text.split('@').length !== 2) throw new UsageError(`--axis ${text}: write x, y, z, 1, 2, 3 or a direction and a point as "0,0,1@10,0,0".`);
  const largest = Math.max(...direction.map((element) => Math.abs(element)));
  if (largest < 1e-9 || largest > 1e9) throw new UsageError(`--axis ${text}: the direction needs an element that is neither 0 nor beyond 1e9.`);
  return { kind: 'typed', direction, point };
}

function readVector(text: string): Vector3 | undefined {
  const numbers = text.split(',').map((word) => (/^\s*[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?\s*$/i.test(word) ? Number(word) : NaN));
  const [x = NaN, y = NaN, z = NaN] = numbers;
  return numbers.length === 3 && numbers.every((number) => Number.isFinite(number)) ? [x, y, z] : undefined;
}

function readFormat(text: string): Command['format'] {
  if (text === 'table' || text === 'json' || text === 'csv') return text;
  throw new UsageError(`"${text}" is no format of the output; write table, json or csv.`);
}

import { formatFigure } from '@masswright/units';

type Steps = readonly (readonly [from: number, symbol: string, size: number])[];

const lengths: Steps = [
  [1000, 'km', 1000],
  [1, 'm', 1],
  [1e-3, 'mm', 1e-3],
  [0, 'µm', 1e-6],
];
const masses: Steps = [
  [1e9, 'Mt', 1e9],
  [1e6, 'kt', 1e6],
  [1e3, 't', 1e3],
  [1, 'kg', 1],
  [1e-3, 'g', 1e-3],
  [1e-6, 'mg', 1e-6],
  [0, 'µg', 1e-9],
];

function write(value: number, steps: Steps, digits: number): { figure: string; unit: string } {
  const step = steps.find(([from]) => Math.abs(value) >= from);
  if (!step || !Number.isFinite(value)) return { figure: '–', unit: '' };
  return { figure: formatFigure(value / step[2], { digits }), unit: step[1] };
}

/** A length or a mass of whatever size, in the unit in which it reads easily: for judging by eye, never for a record. */
export const writeRoughLength = (lengthM: number, digits = 3): { figure: string; unit: string } => write(lengthM, lengths, digits);
export const writeRoughMass = (massKg: number, digits = 3): { figure: string; unit: string } => write(massKg, masses, digits);
export const sayRoughLength = (lengthM: number): string => Object.values(writeRoughLength(lengthM)).join(' ');

import { findUnitsSpelled, lowerRaised } from './spell-unit';
import { getUnit, toSi, type Unit } from './unit';
import { unitTable, type Quantity } from './unit-table';

export type ParsedQuantity = { value: number; unit: Unit } | { error: string };

const names: Record<Quantity, { noun: string; example: string }> = {
  length: { noun: 'a length', example: '12.5 mm' },
  area: { noun: 'an area', example: '3.2 cm²' },
  volume: { noun: 'a volume', example: '4.1 cm³' },
  mass: { noun: 'a mass', example: '0.35 kg' },
  density: { noun: 'a density', example: '2.7 g/cm³' },
  inertia: { noun: 'a moment of inertia', example: '0.002 kg·m²' },
  torque: { noun: 'a torque', example: '1.5 N·m' },
  energy: { noun: 'an energy', example: '20 J' },
  angularSpeed: { noun: 'a speed of rotation', example: '3000 r/min' },
  angularAcceleration: { noun: 'an angular acceleration', example: '60 rad/s²' },
  time: { noun: 'a time', example: '0.5 s' },
};

// A number, thousands perhaps set off by one kind of space, an exponent of either kind; then the unit.
const space = '[ \\u00a0\\u2009\\u202f]';
const numberPattern = new RegExp(`^([+-]?(?:\\d{1,3}(?:${space}\\d{3})+(?![\\d])|\\d+)?(?:\\.\\d*)?)(?:[eE]([+-]?\\d+)|\\s*[×x*·]\\s*10\\s*(?:\\^|\\*\\*)?\\s*([+-]?\\d+))?`);

/**
 * Reads a number with its unit as a person types it, `2.7 g/cm3`, `2.7e3 kg/m^3`, `1 200 r/min`, into SI.
 * A decimal comma is refused rather than guessed: it could be a thousands separator.
 *
 * @param bareUnit symbol of the unit that is meant where none is written; without it a number without a unit is refused
 * @returns the value in SI and the unit that was written, or a sentence that says what is wrong
 */
export function parseQuantity(text: string, quantity: Quantity, { bareUnit }: { bareUnit?: string } = {}): ParsedQuantity {
  const { noun, example } = names[quantity];
  const typed = lowerSigns(text.trim());
  if (typed === '') return { error: `Write ${noun}, for instance ${example}.` };
  const match = numberPattern.exec(typed);
  const digits = (match?.[1] ?? '').replace(new RegExp(space, 'g'), '');
  if (!/\d/.test(digits)) return { error: `Begin with a number: write ${noun} as ${example}.` };
  const rest = typed.slice(match?.[0].length ?? 0);
  if (/^\s*[,']/.test(rest)) return { error: `Write the number with a decimal point and without other separators, as in ${example}.` };
  if (/^[\d.]/.test(rest)) return { error: `"${text.trim()}" does not begin with a number that can be read: write ${noun} as ${example}.` };

  const number = Number(`${digits}e${match?.[2] ?? match?.[3] ?? '0'}`);
  if (!Number.isFinite(number)) return { error: 'This number is too large.' };
  const unit = chooseUnit(rest.trim(), quantity, bareUnit);
  if ('error' in unit) return unit;
  const value = toSi(number, unit);
  return Number.isFinite(value) ? { value, unit } : { error: 'This number is too large.' };
}

function chooseUnit(text: string, quantity: Quantity, bareUnit: string | undefined): Unit | { error: string } {
  const { noun, example } = names[quantity];
  if (text === '') {
    if (bareUnit !== undefined) return getUnit(unitTable[quantity], bareUnit);
    return { error: `State the unit of ${noun}, for instance ${example}.` };
  }
  const [unit, other] = findUnitsSpelled(text, quantity);
  const known = unitTable[quantity].map(({ symbol }) => symbol).join(', ');
  if (unit === undefined) return { error: `"${text}" is not a unit of ${noun} that is known here. Known are ${known}.` };
  if (other !== undefined) return { error: `"${text}" can mean ${unit.symbol} or ${other.symbol}: write one of them.` };
  return unit;
}

/** Minus signs of typography as hyphens, and raised exponents as plain digits, in front of the unit only where a power of ten is written. */
function lowerSigns(text: string): string {
  return text.replace(/[−–]/g, '-').replace(/([×x*·]\s*10)([⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)/, (_, ten: string, power: string) => `${ten}^${lowerRaised(power)}`);
}

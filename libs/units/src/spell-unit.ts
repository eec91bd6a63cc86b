import type { Unit } from './unit';
import { unitTable, type Quantity } from './unit-table';

const raised: Record<string, string> = { '⁰': '0', '¹': '1', '²': '2', '³': '3', '⁴': '4', '⁵': '5', '⁶': '6', '⁷': '7', '⁸': '8', '⁹': '9', '⁻': '-', '⁺': '' };

/** Raised digits and signs as plain ones: `10⁻⁶` as `10-6`. */
export function lowerRaised(text: string): string {
  return text.replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺]/g, (sign) => raised[sign] ?? sign);
}

/**
 * One form for the many in which a unit is typed: `kg m^2`, `kg*m2`, `kg-m²` and `kg·m²` are the same. A hyphen stands between factors
 * unless a digit follows, where it is the sign of an exponent.
 */
export function normaliseUnit(text: string): string {
  return lowerRaised(text.normalize('NFC'))
    .replace(/μ/g, 'µ')
    .replace(/\*\*|\^/g, '')
    .replace(/[−–]/g, '-')
    .replace(/-(?!\d)/g, '·')
    .replace(/\s*\/\s*/g, '/')
    .trim()
    .replace(/[\s·*×⋅∙•.]+/g, '·');
}

const forms = (unit: Unit): string[] => [unit.symbol, ...unit.spellings].map(normaliseUnit);

/** The units of a quantity that a typed text can mean: one by its exact spelling, else all that differ from it in case only. */
export function findUnitsSpelled(text: string, quantity: Quantity): Unit[] {
  const form = normaliseUnit(text);
  const units = unitTable[quantity];
  const exact = units.filter((unit) => forms(unit).includes(form));
  if (exact.length > 0) return exact;
  return units.filter((unit) => forms(unit).some((spelling) => spelling.toLowerCase() === form.toLowerCase()));
}

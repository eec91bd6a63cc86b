import { getUnit, type Unit } from './unit';
import { unitTable, type Quantity } from './unit-table';

/** Sets of units in which figures are shown together. */
export const unitFamilies = ['SI', 'g-mm', 't-mm', 'lb-in', 'slug-ft'] as const;
export type UnitFamily = (typeof unitFamilies)[number];

const symbols: Record<UnitFamily, Record<Quantity, string>> = {
  SI: { length: 'm', area: 'm²', volume: 'm³', mass: 'kg', density: 'kg/m³', inertia: 'kg·m²', torque: 'N·m', energy: 'J', angularSpeed: 'rad/s', angularAcceleration: 'rad/s²', time: 's' },
  'g-mm': { length: 'mm', area: 'mm²', volume: 'mm³', mass: 'g', density: 'g/cm³', inertia: 'kg·mm²', torque: 'N·mm', energy: 'mJ', angularSpeed: 'r/min', angularAcceleration: 'rad/s²', time: 's' },
  't-mm': { length: 'mm', area: 'mm²', volume: 'mm³', mass: 't', density: 't/mm³', inertia: 't·mm²', torque: 'N·mm', energy: 'mJ', angularSpeed: 'rad/s', angularAcceleration: 'rad/s²', time: 's' },
  'lb-in': { length: 'in', area: 'in²', volume: 'in³', mass: 'lb', density: 'lb/in³', inertia: 'lb·in²', torque: 'lbf·in', energy: 'in·lbf', angularSpeed: 'r/min', angularAcceleration: 'rad/s²', time: 's' },
  'slug-ft': { length: 'ft', area: 'ft²', volume: 'ft³', mass: 'slug', density: 'slug/ft³', inertia: 'slug·ft²', torque: 'lbf·ft', energy: 'ft·lbf', angularSpeed: 'r/min', angularAcceleration: 'rad/s²', time: 's' },
};

/** The unit in which a family shows a quantity. */
export function getDisplayUnit(family: UnitFamily, quantity: Quantity): Unit {
  return getUnit(unitTable[quantity], symbols[family][quantity]);
}

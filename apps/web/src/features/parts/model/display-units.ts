import { getUnit, unitTable, type Quantity, type Unit } from '@masswright/units';

/** The step of a unit: taken from `from` (in SI) upwards. Ascending. */
interface Step {
  from: number;
  symbol: string;
}

/** Of the SI-based units, the one in which a figure of this size is read most easily. Moments keep kg·mm², so that they compare at a glance. */
const steps: Partial<Record<Quantity, readonly Step[]>> = {
  mass: [
    { from: 0, symbol: 'g' },
    { from: 1, symbol: 'kg' },
  ],
  volume: [
    { from: 0, symbol: 'mm³' },
    { from: 1e-6, symbol: 'cm³' },
    { from: 1, symbol: 'm³' },
  ],
  area: [
    { from: 0, symbol: 'mm²' },
    { from: 1e-4, symbol: 'cm²' },
    { from: 1, symbol: 'm²' },
  ],
  torque: [
    { from: 0, symbol: 'N·mm' },
    { from: 0.01, symbol: 'N·m' },
  ],
  energy: [
    { from: 0, symbol: 'mJ' },
    { from: 0.01, symbol: 'J' },
    { from: 1e4, symbol: 'kJ' },
  ],
  length: [{ from: 0, symbol: 'mm' }],
  inertia: [{ from: 0, symbol: 'kg·mm²' }],
};

export function chooseDisplayUnit(quantity: Quantity, valueSi: number): Unit {
  const size = Math.abs(valueSi);
  const step = steps[quantity]?.findLast(({ from }) => size >= from);
  if (!step) throw new RangeError(`No display unit is chosen for ${quantity}.`);
  return getUnit(unitTable[quantity], step.symbol);
}

import type { Unit } from './unit';

/**
 * Factors after NIST Special Publication 811 (2008), Guide for the Use of the International System of Units, appendix B. All of them follow
 * exactly from five definitions: 1 in = 0.0254 m, 1 ft = 12 in, 1 lb = 0.453 592 37 kg, standard gravity 9.806 65 m/s², 1 r = 2π rad.
 * Numerators and denominators are reduced until both are exact binary64 numbers; a test recomputes each from the definitions.
 */
export const quantities = ['length', 'area', 'volume', 'mass', 'density', 'inertia', 'torque', 'energy', 'angularSpeed', 'angularAcceleration', 'time'] as const;
export type Quantity = (typeof quantities)[number];

function unit(symbol: string, numerator: number, denominator = 1, spellings: readonly string[] = []): Unit {
  return { symbol, numerator, denominator, spellings };
}

export const unitTable: Record<Quantity, readonly Unit[]> = {
  length: [
    unit('m', 1, 1, ['metre', 'metres', 'meter', 'meters']),
    unit('cm', 1, 100, ['centimetre', 'centimetres', 'centimeter', 'centimeters']),
    unit('mm', 1, 1000, ['millimetre', 'millimetres', 'millimeter', 'millimeters']),
    unit('µm', 1, 1e6, ['um', 'micron', 'microns', 'micrometre', 'micrometres', 'micrometer', 'micrometers']),
    unit('in', 127, 5000, ['inch', 'inches']),
    unit('ft', 381, 1250, ['foot', 'feet']),
  ],
  area: [unit('m²', 1), unit('cm²', 1, 1e4), unit('mm²', 1, 1e6), unit('in²', 16129, 25e6, ['sq in']), unit('ft²', 145161, 1562500, ['sq ft'])],
  volume: [
    unit('m³', 1),
    unit('cm³', 1, 1e6, ['cc', 'mL', 'ml']),
    unit('mm³', 1, 1e9),
    unit('L', 1, 1000, ['l', 'dm³', 'litre', 'litres', 'liter', 'liters']),
    unit('in³', 2048383, 125e9, ['cu in']),
    unit('ft³', 55306341, 1953125000, ['cu ft']),
  ],
  mass: [
    unit('kg', 1, 1, ['kilogram', 'kilograms']),
    unit('g', 1, 1000, ['gram', 'grams', 'gramme', 'grammes']),
    unit('mg', 1, 1e6, ['milligram', 'milligrams']),
    unit('t', 1000, 1, ['tonne', 'tonnes']),
    unit('lb', 45359237, 1e8, ['lbs', 'lbm', 'pound', 'pounds']),
    unit('oz', 45359237, 16e8, ['ounce', 'ounces']),
    unit('slug', 8896443230521, 609.6e9, ['slugs']),
  ],
  density: [
    unit('kg/m³', 1, 1, ['kg m-3', 'g/L', 'g/l']),
    unit('g/cm³', 1000, 1, ['g cm-3', 'g/cc', 'g/mL', 'g/ml', 'kg/L', 'kg/l', 'kg/dm³', 't/m³']),
    unit('t/mm³', 1e12, 1, ['t mm-3', 'tonne/mm³']),
    unit('g/mm³', 1e6, 1, ['g mm-3']),
    unit('kg/mm³', 1e9, 1, ['kg mm-3']),
    unit('lb/in³', 56699046250, 2048383, ['lbs/in³', 'lbm/in³', 'lb/cu in']),
    unit('lb/ft³', 28349523125, 1769802912, ['lbs/ft³', 'lbm/ft³', 'lb/cu ft', 'pcf']),
    unit('oz/in³', 28349523125, 16387064, ['oz/cu in']),
    unit('slug/ft³', 5560277019075625, 10788718551552, ['slugs/ft³']),
  ],
  inertia: [
    unit('kg·m²', 1, 1, ['N·m·s²']),
    unit('kg·cm²', 1, 1e4),
    unit('g·m²', 1, 1000),
    unit('kg·mm²', 1, 1e6),
    unit('g·cm²', 1, 1e7),
    unit('g·mm²', 1, 1e9),
    unit('t·mm²', 1, 1000, ['tonne·mm²', 'N·mm·s²']),
    unit('lb·in²', 731599133573, 25e14, ['lbs·in²', 'lbm·in²']),
    unit('lb·ft²', 6584392202157, 15625e10, ['lbs·ft²', 'lbm·ft²']),
    unit('oz·in²', 731599133573, 4e16),
    unit('slug·ft²', 3389544870828501, 25e14, ['lbf·ft·s²', 'ft·lbf·s²']),
    unit('lbf·in·s²', 1129848290276167, 1e16, ['in·lbf·s²']),
    unit('ozf·in·s²', 1129848290276167, 16e16, ['in·ozf·s²']),
  ],
  torque: [
    unit('N·m', 1, 1, ['Nm']),
    unit('N·cm', 1, 100, ['Ncm']),
    unit('N·mm', 1, 1000, ['Nmm', 'mN·m', 'mNm']),
    unit('kN·m', 1000, 1, ['kNm']),
    unit('lbf·in', 1129848290276167, 1e16, ['in·lbf', 'lb·in', 'in·lb', 'lbs·in', 'in·lbs']),
    unit('lbf·ft', 3389544870828501, 25e14, ['ft·lbf', 'lb·ft', 'ft·lb', 'lbs·ft', 'ft·lbs']),
    unit('ozf·in', 1129848290276167, 16e16, ['in·ozf', 'oz·in', 'in·oz']),
    unit('kgf·cm', 980665, 1e7, ['kg·cm']),
    unit('kgf·m', 980665, 1e5, ['kg·m', 'kp·m']),
  ],
  energy: [
    unit('J', 1, 1, ['N·m', 'Nm', 'W·s', 'joule', 'joules']),
    unit('mJ', 1, 1000, ['N·mm']),
    unit('kJ', 1000),
    unit('MJ', 1e6),
    unit('W·h', 3600, 1, ['Wh']),
    unit('kW·h', 3.6e6, 1, ['kWh']),
    unit('ft·lbf', 3389544870828501, 25e14, ['lbf·ft', 'ft·lb', 'lb·ft']),
    unit('in·lbf', 1129848290276167, 1e16, ['lbf·in', 'in·lb', 'lb·in']),
  ],
  angularSpeed: [
    unit('rad/s', 1, 1, ['rad s-1', 'radians/s']),
    unit('r/min', Math.PI, 30, ['rpm', 'rev/min', '1/min', 'min-1', 'U/min']),
    unit('rev/s', 2 * Math.PI, 1, ['r/s', 'rps', '1/s', 's-1', 'Hz']),
    unit('deg/s', Math.PI, 180, ['°/s', 'degrees/s']),
  ],
  angularAcceleration: [unit('rad/s²', 1, 1, ['rad s-2']), unit('deg/s²', Math.PI, 180, ['°/s²']), unit('rev/s²', 2 * Math.PI, 1, ['r/s²'])],
  time: [
    unit('s', 1, 1, ['sec', 'second', 'seconds']),
    unit('ms', 1, 1000, ['millisecond', 'milliseconds']),
    unit('min', 60, 1, ['minute', 'minutes']),
    unit('h', 3600, 1, ['hr', 'hour', 'hours']),
  ],
};

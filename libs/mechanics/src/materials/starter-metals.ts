import { starter, type StarterMaterial } from './starter-material';

/** Densities at room temperature, check values section 7. Where two sources differ, the spread reaches the other one. */
export const starterMetals: readonly StarterMaterial[] = [
  starter('al', 'Aluminium, pure', 'aluminium', 2699, 'pure', 'nist'),
  starter('al-2024', 'Aluminium 2024', 'aluminium', 2780, 'wrought', 'handbook'),
  starter('al-2219', 'Aluminium 2219', 'aluminium', 2810, 'wrought', 'tpsx'),
  starter('al-5052', 'Aluminium 5052', 'aluminium', 2680, 'wrought', 'memory'),
  starter('al-6061-t6', 'Aluminium 6061-T6', 'aluminium', 2700, 'wrought', 'handbook'),
  starter('al-7075-t6', 'Aluminium 7075-T6', 'aluminium', 2810, 'wrought', 'handbook'),
  starter('al-a380', 'Aluminium A380, die-cast', 'aluminium', 2740, 'cast', 'memory'),

  starter('iron', 'Iron, pure', 'steel', 7874, 'pure', 'nist'),
  starter('steel-mild', 'Mild steel', 'steel', 7850, 'steel', 'memory'),
  starter('steel-1020', 'Steel 1020', 'steel', 7870, 'steel', 'handbook'),
  starter('steel-1040', 'Steel 1040', 'steel', 7845, 'steel', 'handbook'),
  starter('steel-4140', 'Steel 4140', 'steel', 7850, 'steel', 'handbook'),
  starter('steel-4340', 'Steel 4340', 'steel', 7850, 'steel', 'handbook'),
  // NASA TPSX has 7900.
  starter('steel-304', 'Stainless steel 304', 'steel', 8000, 100, 'memory'),
  starter('steel-316', 'Stainless steel 316/316L', 'steel', 8000, 'steel', 'handbook'),
  starter('steel-321', 'Stainless steel 321', 'steel', 8030, 'steel', 'tpsx'),
  // NASA TPSX has 7830.
  starter('steel-17-4ph', 'Stainless steel 17-4PH', 'steel', 7800, 'steel', 'memory'),
  starter('iron-grey', 'Grey cast iron', 'steel', 7150, 'cast', 'handbook'),
  starter('iron-ductile', 'Ductile cast iron', 'steel', 7150, 'cast', 'handbook'),

  starter('cu', 'Copper, pure', 'copper', 8960, 'pure', 'nist'),
  starter('cu-c110', 'Copper C110', 'copper', 8890, 'wrought', 'handbook'),
  starter('cu-c170', 'Beryllium copper C170', 'copper', 8260, 'wrought', 'handbook'),
  starter('cu-c220', 'Brass C220, 90 % copper', 'copper', 8800, 'wrought', 'handbook'),
  starter('cu-c260', 'Brass C260, 70 % copper', 'copper', 8530, 'wrought', 'handbook'),
  starter('cu-c280', 'Brass C280, 60 % copper', 'copper', 8390, 'wrought', 'handbook'),
  starter('cu-c360', 'Brass C360, free-cutting', 'copper', 8500, 'wrought', 'handbook'),
  starter('cu-bronze', 'Bronze', 'copper', 8820, 'cast', 'nist'),

  // The NIST list has 4540.
  starter('ti', 'Titanium, pure', 'titanium', 4510, 'wrought', 'memory'),
  starter('ti-6al-4v', 'Titanium Ti-6Al-4V', 'titanium', 4430, 'wrought', 'memory'),

  starter('mg', 'Magnesium, pure', 'other-metal', 1740, 'pure', 'nist'),
  starter('mg-az31b', 'Magnesium AZ31B', 'other-metal', 1770, 'wrought', 'handbook'),
  starter('mg-az91e', 'Magnesium AZ91E, cast', 'other-metal', 1810, 'cast', 'handbook'),
  starter('ni', 'Nickel, pure', 'other-metal', 8902, 'pure', 'nist'),
  starter('ni-718', 'Nickel alloy 718', 'other-metal', 8190, 'wrought', 'memory'),
  starter('ni-625', 'Nickel alloy 625', 'other-metal', 8440, 'wrought', 'memory'),
  starter('zn', 'Zinc, pure', 'other-metal', 7133, 'pure', 'nist'),
  starter('pb', 'Lead, pure', 'other-metal', 11350, 'pure', 'nist'),
  starter('sn', 'Tin, pure', 'other-metal', 7310, 'pure', 'nist'),
  starter('w', 'Tungsten, pure', 'other-metal', 19300, 'pure', 'nist'),
  // 17 000 to 18 500, by the share of tungsten.
  starter('w-heavy-alloy', 'Tungsten heavy alloy', 'other-metal', 17750, 750, 'memory'),
];

import type { Picture, Shape } from './shape';

export interface BeamInput {
  /** The axis's letter, such as "x". */
  axis: string;
  /** Ends of the bounding box and place of the centre of mass along the axis, all in one unit. */
  minimum: number;
  maximum: number;
  centre: number;
  /** The unit's symbol, such as "mm". */
  unit: string;
  /** Writes a number of that unit for people. */
  format: (value: number) => string;
  /** The same for the centre, where its uncertainty decides on its digits or stands with it. */
  formatCentre?: (value: number) => string;
  width?: number;
}

const margin = 8;
const fulcrumHalfWidth = 6.5;
const fulcrumHeight = 11;

/** Where a value lies between two ends, from 0 to 1; a box without extent has its centre in the middle. Values outside keep to the ends. */
export function computeShare(minimum: number, maximum: number, value: number): number {
  const span = maximum - minimum;
  if (!(span > 0)) return 0.5;
  return Math.min(1, Math.max(0, (value - minimum) / span));
}

/**
 * The beam: the bounding box along one axis as a bar, on a fulcrum at the centre of mass; a hairline marks the middle of the box.
 * All beams of a body have the same drawn length, so that the balance along a short axis can be read as well as along a long one:
 * the numbers at the ends say how long each is.
 */
export function computeBeam(input: BeamInput): Picture {
  const { axis, minimum, maximum, centre, unit, format, formatCentre = format, width = 260 } = input;
  const height = 76;
  const barY = 34;
  const left = margin;
  const right = width - margin;
  const length = right - left;
  const x = left + computeShare(minimum, maximum, centre) * length;
  const middle = left + length / 2;
  const shapes: Shape[] = [
    { kind: 'text', at: [left, 14], text: axis.toUpperCase(), anchor: 'start', face: 'label', size: 12, fill: 'soft', bold: true },
    { kind: 'text', at: [left + 13, 14], text: unit, anchor: 'start', face: 'label', size: 12, fill: 'soft' },
    { kind: 'text', at: [right, 14], text: formatCentre(centre), anchor: 'end', face: 'figure', size: 14, fill: 'ink', bold: true },
    { kind: 'line', from: [middle, barY - 7], to: [middle, barY + 7], stroke: 'edge', strokeWidth: 1 },
    { kind: 'line', from: [left, barY - 5], to: [left, barY + 5], stroke: 'ink', strokeWidth: 1 },
    { kind: 'line', from: [right, barY - 5], to: [right, barY + 5], stroke: 'ink', strokeWidth: 1 },
    { kind: 'line', from: [left, barY], to: [right, barY], stroke: 'ink', strokeWidth: 3 },
    {
      kind: 'polygon',
      points: [
        [x, barY + 1.5],
        [x + fulcrumHalfWidth, barY + 1.5 + fulcrumHeight],
        [x - fulcrumHalfWidth, barY + 1.5 + fulcrumHeight],
      ],
      fill: 'ink',
      outline: 'sheet',
    },
    { kind: 'text', at: [left, 66], text: format(minimum), anchor: 'start', face: 'figure', size: 12, fill: 'soft' },
    { kind: 'text', at: [right, 66], text: format(maximum), anchor: 'end', face: 'figure', size: 12, fill: 'soft' },
  ];
  return {
    width,
    height,
    shapes,
    alternative: `Along ${axis} the box reaches from ${format(minimum)} to ${format(maximum)} ${unit}; the centre of mass is at ${formatCentre(centre)} ${unit}.`,
  };
}

/**
 * Beams without words for a row of a table, side by side, one for each share: where the centre of mass lies in the box along an axis, from 0 to 1.
 * One picture and not three: a list has hundreds of them.
 */
export function computeSmallBeams(shares: readonly number[], width = 30, gap = 7): Picture {
  return {
    width: shares.length * (width + gap) - gap,
    height: smallHeight,
    shapes: shares.flatMap((share, index) => drawSmallBeam(index * (width + gap), width, computeShare(0, 1, share))),
    alternative: `Centre of mass in the box: ${shares.map((share, index) => `${'xyz'.charAt(index)} ${Math.round(share * 100)} %`).join(', ')}.`,
  };
}

const smallHeight = 14;

function drawSmallBeam(left: number, width: number, share: number): Shape[] {
  const x = left + 1 + share * (width - 2);
  return [
    { kind: 'line', from: [left + 1, 3], to: [left + width - 1, 3], stroke: 'ink', strokeWidth: 1.6 },
    {
      kind: 'polygon',
      points: [
        [x, 4],
        [x + 4, 11],
        [x - 4, 11],
      ],
      fill: 'ink',
    },
  ];
}

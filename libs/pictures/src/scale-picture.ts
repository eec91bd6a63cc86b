import type { Picture, Point, Shape } from './shape';

/** An outline as cells, row by row from the upper left; 1 is body. */
export interface Outline {
  width: number;
  height: number;
  cells: ArrayLike<number>;
}

export interface ScaleInput {
  /** Extents of the body as it is seen, in metres. */
  widthM: number;
  heightM: number;
  /** Null where it isn't known: then the box is drawn. */
  outline: Outline | null;
  /** Writes a length in metres for people. */
  format: (lengthM: number) => string;
}

interface Companion {
  name: string;
  widthM: number;
  heightM: number;
  draw: (x: number, y: number, width: number, height: number) => Shape[];
}

const panelWidth = 168;
const panelHeight = 150;
const floor = 118;
const roomWidth = panelWidth - 20;
const roomHeight = 104;
/** Between the body and what stands beside it. */
const gap = 10;
/** What would be smaller than this is drawn as a dot of this size, and said to be one. */
const dot = 2.5;

/** A hand held up, in a box one wide and one high. */
const hand: readonly Point[] = [
  [0.3, 1], [0.27, 0.78], [0.12, 0.62], [0, 0.47], [0.05, 0.42], [0.13, 0.45], [0.26, 0.58], [0.24, 0.2], [0.28, 0.12], [0.34, 0.13], [0.37, 0.2], [0.41, 0.44],
  [0.42, 0.08], [0.47, 0], [0.53, 0.01], [0.56, 0.08], [0.57, 0.43], [0.61, 0.12], [0.66, 0.06], [0.72, 0.09], [0.73, 0.16], [0.71, 0.47], [0.8, 0.26], [0.87, 0.22],
  [0.92, 0.26], [0.91, 0.34], [0.83, 0.66], [0.76, 0.8], [0.75, 1],
];

function drawDisc(x: number, y: number, width: number, height: number): Shape[] {
  const ring = (share: number): Point[] =>
    Array.from({ length: 40 }, (_, index): Point => {
      const angle = (2 * Math.PI * index) / 40;
      return [x + (width / 2) * (1 + share * Math.cos(angle)), y + (height / 2) * (1 + share * Math.sin(angle))];
    });
  return [
    { kind: 'polygon', points: ring(1), fill: 'rule', outline: 'edge' },
    ...(width > 14 ? [{ kind: 'polygon', points: ring(0.8), fill: 'rule', outline: 'edge' } as const] : []),
  ];
}

function drawHand(x: number, y: number, width: number, height: number): Shape[] {
  return [{ kind: 'polygon', points: hand.map(([h, v]): Point => [x + h * width, y + v * height]), fill: 'rule', outline: 'edge' }];
}

function drawDoor(x: number, y: number, width: number, height: number): Shape[] {
  const leaf: Shape = { kind: 'rectangle', x, y, width, height, fill: 'rule', stroke: 'edge', strokeWidth: 1 };
  if (width < 12) return [leaf];
  return [
    leaf,
    { kind: 'rectangle', x: x + width * 0.18, y: y + height * 0.09, width: width * 0.64, height: height * 0.34, stroke: 'edge', strokeWidth: 0.8 },
    { kind: 'rectangle', x: x + width * 0.18, y: y + height * 0.55, width: width * 0.64, height: height * 0.36, stroke: 'edge', strokeWidth: 0.8 },
    { kind: 'rectangle', x: x + width * 0.86, y: y + height * 0.48, width: width * 0.06, height: height * 0.05, fill: 'edge' },
  ];
}

/** Sizes are common practice: a coin that most currencies have, an adult's hand, the door of a room. */
const companions: readonly Companion[] = [
  { name: 'coin', widthM: 0.024, heightM: 0.024, draw: drawDisc },
  { name: 'hand', widthM: 0.105, heightM: 0.19, draw: drawHand },
  { name: 'door', widthM: 0.9, heightM: 2, draw: drawDoor },
];

/** The cells of an outline as few rectangles: runs along a row, joined with equal ones below. */
export function joinCells({ width, height, cells }: Outline): { column: number; row: number; columns: number; rows: number }[] {
  const done: { column: number; row: number; columns: number; rows: number }[] = [];
  let open = new Map<string, { column: number; row: number; columns: number; rows: number }>();
  for (let row = 0; row < height; row++) {
    const next: typeof open = new Map();
    for (let column = 0; column < width; column++) {
      if (cells[row * width + column] !== 1) continue;
      const begin = column;
      while (column + 1 < width && cells[row * width + column + 1] === 1) column += 1;
      const key = `${begin} ${column}`;
      const above = open.get(key);
      const run = above ?? { column: begin, row, columns: column - begin + 1, rows: 0 };
      run.rows += 1;
      if (!above) done.push(run);
      next.set(key, run);
    }
    open = next;
  }
  return done;
}

function drawBody({ outline }: ScaleInput, x: number, y: number, width: number, height: number): Shape[] {
  if (outline === null || width <= dot || height <= dot) return [{ kind: 'rectangle', x, y, width, height, fill: 'verdigris', fillOpacity: outline === null ? 0.25 : 1, stroke: 'verdigris', strokeWidth: 1 }];
  const [stepX, stepY] = [width / outline.width, height / outline.height];
  return joinCells(outline).map(({ column, row, columns, rows }) => ({
    kind: 'rectangle' as const,
    x: x + column * stepX,
    y: y + row * stepY,
    // A little larger, so that neighbours leave no seam between them.
    width: columns * stepX + Math.min(0.5, stepX / 2),
    height: rows * stepY + Math.min(0.5, stepY / 2),
    fill: 'verdigris' as const,
  }));
}

/** "3.2 hands long" or "1/14 of a door". */
export function describeRatio(ratio: number, name: string): string {
  const write = (value: number): string => (value < 9.5 ? String(Number(value.toPrecision(2))) : value < 1e6 ? String(Math.round(Number(value.toPrecision(2)))) : value.toExponential(0).replace('e+', '×10^'));
  if (ratio >= 1.05) return `${write(ratio)} ${name}s long`;
  if (ratio > 0.95) return `as long as a ${name}`;
  return ratio > 0.12 ? `${String(Number(ratio.toPrecision(2)))} of a ${name}` : `1/${write(1 / ratio)} of a ${name}`;
}

function drawPanel(input: ScaleInput, companion: Companion, left: number): Shape[] {
  const total = input.widthM + companion.widthM;
  const scale = Math.min((roomWidth - gap) / total, roomHeight / Math.max(input.heightM, companion.heightM));
  const size = (lengthM: number): number => Math.max(dot, lengthM * scale);
  const [bodyWidth, bodyHeight] = [size(input.widthM), size(input.heightM)];
  const [besideWidth, besideHeight] = [size(companion.widthM), size(companion.heightM)];
  const begin = left + (panelWidth - bodyWidth - besideWidth - gap) / 2;
  const ratio = Math.max(input.widthM, input.heightM) / Math.max(companion.widthM, companion.heightM);
  return [
    { kind: 'line', from: [left + 6, floor + 0.5], to: [left + panelWidth - 6, floor + 0.5], stroke: 'rule', strokeWidth: 1 },
    ...drawBody(input, begin, floor - bodyHeight, bodyWidth, bodyHeight),
    ...companion.draw(begin + bodyWidth + gap, floor - besideHeight, besideWidth, besideHeight),
    { kind: 'text', at: [left + panelWidth / 2, panelHeight - 12], text: describeRatio(ratio, companion.name), anchor: 'middle', face: 'label', size: 13, fill: 'soft' },
  ];
}

/**
 * A body to scale beside a coin, a hand and a door: each pair in a panel of its own, as large as the panel allows, both standing on one line. A unit that
 * is mistaken shows at once: the body or its companion is a speck.
 */
export function computeScalePicture(input: ScaleInput): Picture {
  const longest = Math.max(input.widthM, input.heightM);
  const ratios = companions.map(({ name, widthM, heightM }) => describeRatio(longest / Math.max(widthM, heightM), name));
  return {
    width: panelWidth * companions.length,
    height: panelHeight,
    shapes: companions.flatMap((companion, index) => drawPanel(input, companion, index * panelWidth)),
    alternative: `The body is ${input.format(longest)} long: ${ratios.join(', ')}.`,
  };
}

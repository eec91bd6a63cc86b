import type { Symmetric3 } from '@masswright/contracts';
import type { Picture, Shape } from './shape';

export interface TensorPlateInput {
  /** Matrix elements in the unit that `unit` names. */
  tensor: Symmetric3;
  unit: string;
  /** Writes all nine elements with the same number of decimals, so that they align; fewer are filled up with spaces that don't break. */
  format: (value: number, element: keyof Symmetric3) => string;
  /** Writes what stands under an element, such as its uncertainty; as long as the elements where it is to align with them. */
  formatBelow?: (element: keyof Symmetric3) => string;
  width?: number;
}

const rows = [
  ['xx', 'xy', 'zx'],
  ['xy', 'yy', 'yz'],
  ['zx', 'yz', 'zz'],
] as const;
const letters = ['x', 'y', 'z'] as const;

/** The strongest ink of a cell; text on it keeps its contrast by day and by night. */
const strongestInk = 0.26;

/** The nine elements in reading order, each with its magnitude relative to the largest (0 to 1). */
export function computePlateCells(tensor: Symmetric3): { element: keyof Symmetric3; value: number; share: number; row: number; column: number }[] {
  const largest = Math.max(...Object.values(tensor).map(Math.abs));
  return rows.flatMap((row, rowIndex) =>
    row.map((element, column) => ({
      element,
      value: tensor[element],
      share: largest > 0 ? Math.abs(tensor[element]) / largest : 0,
      row: rowIndex,
      column,
    })),
  );
}

/** The tensor plate: the symmetric matrix with the magnitude of each element as ink. */
export function computeTensorPlate(input: TensorPlateInput): Picture {
  const { tensor, unit, format, formatBelow, width = 372 } = input;
  const gutter = 18;
  const cellWidth = (width - gutter - 1) / 3;
  const cellHeight = formatBelow ? 50 : 40;
  const height = gutter + 3 * cellHeight + 1;
  const cells = computePlateCells(tensor);
  const texts = cells.map((cell) => format(cell.value, cell.element));
  const below = cells.map((cell) => formatBelow?.(cell.element) ?? '');
  // Long numbers shrink rather than leave their cell; 0.6 em is the advance of the figure face.
  const longest = Math.max(...texts.map((text) => text.length), ...below.map((text) => text.length));
  const size = Math.min(formatBelow ? 13.5 : 14.5, (cellWidth - 18) / (longest * 0.6));
  const shapes: Shape[] = [];
  for (const [index, cell] of cells.entries()) {
    const x = gutter + cell.column * cellWidth;
    const y = gutter + cell.row * cellHeight;
    shapes.push(
      { kind: 'rectangle', x, y, width: cellWidth, height: cellHeight, fill: 'ink', fillOpacity: cell.share * strongestInk, stroke: 'rule', strokeWidth: 1 },
      { kind: 'text', at: [x + cellWidth - 9, y + cellHeight / 2 + size * 0.35 - (formatBelow ? 8 : 0)], text: texts[index] ?? '', anchor: 'end', face: 'figure', size, fill: 'ink', bold: cell.row === cell.column },
    );
    if (formatBelow) shapes.push({ kind: 'text', at: [x + cellWidth - 9, y + cellHeight / 2 + 15], text: below[index] ?? '', anchor: 'end', face: 'figure', size, fill: 'ink' });
  }
  for (const [index, letter] of letters.entries()) {
    shapes.push(
      { kind: 'text', at: [gutter + (index + 0.5) * cellWidth, gutter - 6], text: letter, anchor: 'middle', face: 'figure', size: 11.5, fill: 'soft' },
      { kind: 'text', at: [gutter - 7, gutter + (index + 0.5) * cellHeight + 4], text: letter, anchor: 'end', face: 'figure', size: 11.5, fill: 'soft' },
    );
  }
  const spoken = cells.filter((cell) => cell.row <= cell.column).map((cell) => `${letters[cell.row] ?? ''}${letters[cell.column] ?? ''} ${[format(cell.value, cell.element), formatBelow?.(cell.element) ?? ''].map((text) => text.trim()).filter(Boolean).join(' ')}`);
  return { width, height, shapes, alternative: `Inertia matrix in ${unit}: ${spoken.join(', ')}.` };
}

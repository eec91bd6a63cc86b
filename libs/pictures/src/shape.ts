/** What a shape is drawn with; the screen maps these names on the theme's colours, paper on fixed ones. */
export const inks = ['ink', 'soft', 'rule', 'edge', 'sheet', 'oxide', 'verdigris', 'amber'] as const;
export type Ink = (typeof inks)[number];

export type Point = readonly [x: number, y: number];

export type Shape =
  | {
      kind: 'rectangle';
      x: number;
      y: number;
      width: number;
      height: number;
      fill?: Ink;
      fillOpacity?: number;
      stroke?: Ink;
      strokeWidth?: number;
    }
  | { kind: 'line'; from: Point; to: Point; stroke: Ink; strokeWidth: number; dash?: readonly number[] }
  | { kind: 'polygon'; points: readonly Point[]; fill: Ink; outline?: Ink }
  | {
      kind: 'text';
      at: Point;
      text: string;
      anchor: 'start' | 'middle' | 'end';
      /** figure: the face of numbers and symbols; label: the face of captions. */
      face: 'figure' | 'label';
      size: number;
      fill: Ink;
      bold?: boolean;
    };

/** A drawing in its own coordinates (y downwards), with the sentence that stands for it where it can't be seen. */
export interface Picture {
  width: number;
  height: number;
  shapes: readonly Shape[];
  alternative: string;
}

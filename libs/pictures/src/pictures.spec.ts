import { describe, expect, it } from 'vitest';
import { computeBeam, computePlateCells, computeShare, computeSmallBeams, computeTensorPlate, writeSvg, type Picture, type Shape } from './index';

const ofKind = <Kind extends Shape['kind']>(picture: Picture, kind: Kind): Extract<Shape, { kind: Kind }>[] =>
  picture.shapes.filter((shape): shape is Extract<Shape, { kind: Kind }> => shape.kind === kind);
const oneDecimal = (value: number): string => value.toFixed(1);

describe('beam', () => {
  const beam = (centre: number): Picture => computeBeam({ axis: 'x', minimum: -10, maximum: 30, centre, unit: 'mm', format: oneDecimal, width: 216 });

  it('stands on a fulcrum at the centre of mass, in proportion to the box', () => {
    // The bar runs from 8 to 208; 0 lies a quarter of the way along a box from -10 to 30.
    expect(ofKind(beam(0), 'polygon')[0]?.points[0]?.[0]).toBe(58);
    expect(ofKind(beam(10), 'polygon')[0]?.points[0]?.[0]).toBe(108);
  });
  it('keeps the fulcrum under the bar when rounding puts the centre just outside of the box', () => {
    expect(computeShare(-10, 30, 30.0000001)).toBe(1);
    expect(computeShare(-10, 30, -10.0000001)).toBe(0);
  });
  it('balances a box without extent in its middle', () => {
    expect(computeShare(4, 4, 4)).toBe(0.5);
  });
  it('says in words what it draws, with unit', () => {
    expect(beam(2.5).alternative).toBe('Along x the box reaches from -10.0 to 30.0 mm; the centre of mass is at 2.5 mm.');
  });
  it('small beams stand side by side in one picture that says what it draws', () => {
    const picture = computeSmallBeams([0, 0.5, 1], 30, 7);
    expect(picture.width).toBe(104);
    expect(ofKind(picture, 'polygon').map(({ points }) => points[0]?.[0])).toEqual([1, 52, 103]);
    expect(picture.alternative).toBe('Centre of mass in the box: x 0 %, y 50 %, z 100 %.');
  });
  it('a small beam stays within its picture at both ends', () => {
    for (const centre of [0, 1]) {
      const points = ofKind(computeSmallBeams([centre]), 'polygon')[0]?.points ?? [];
      expect(points[0]?.[0]).toBeGreaterThanOrEqual(1);
      expect(points[0]?.[0]).toBeLessThanOrEqual(29);
    }
  });
});

describe('tensor plate', () => {
  const tensor = { xx: 100, yy: 200, zz: 250, xy: -50, yz: 5, zx: 0 };

  it('is symmetric: mirrored cells carry the same element', () => {
    const cells = computePlateCells(tensor);
    const at = (row: number, column: number) => cells.find((cell) => cell.row === row && cell.column === column)?.value;
    expect([at(0, 0), at(1, 1), at(2, 2)]).toEqual([100, 200, 250]);
    expect([at(0, 1), at(1, 0)]).toEqual([-50, -50]);
    expect([at(1, 2), at(2, 1)]).toEqual([5, 5]);
    expect([at(0, 2), at(2, 0)]).toEqual([0, 0]);
  });
  it('inks each cell by its magnitude, whatever its sign', () => {
    const shares = computePlateCells(tensor).map((cell) => cell.share);
    expect(shares[8]).toBe(1);
    expect(shares[1]).toBe(0.2);
    expect(shares[2]).toBe(0);
  });
  it('leaves a tensor of nothing without ink', () => {
    expect(computePlateCells({ xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0 }).every((cell) => cell.share === 0)).toBe(true);
  });
  it('shrinks long numbers so that they stay within their cell', () => {
    const picture = computeTensorPlate({ tensor, unit: 'kg·mm²', format: () => '123 456 789.123' });
    const cell = ofKind(picture, 'rectangle')[0];
    const text = ofKind(picture, 'text')[0];
    expect((text?.size ?? 99) * 0.6 * 15).toBeLessThan(cell?.width ?? 0);
  });
});

describe('svg', () => {
  it('escapes hostile text in the drawing and in its title', () => {
    const svg = writeSvg({
      width: 10,
      height: 10,
      shapes: [{ kind: 'text', at: [0, 0], text: '<script>&"', anchor: 'start', face: 'label', size: 10, fill: 'ink' }],
      alternative: 'a < b',
    });
    expect(svg).toContain('&lt;script&gt;&amp;&quot;');
    expect(svg).toContain('<title>a &lt; b</title>');
    expect(svg).not.toContain('<script>');
  });
  it('draws every shape of a plate and a beam', () => {
    const plate = computeTensorPlate({ tensor: { xx: 1, yy: 1, zz: 1, xy: 0, yz: 0, zx: 0 }, unit: 'kg·mm²', format: oneDecimal });
    const svg = writeSvg(plate);
    expect(svg.match(/<(rect|line|polygon|text)/g)?.length).toBe(plate.shapes.length);
  });
});

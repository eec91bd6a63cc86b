import type { Ink, Picture, Point, Shape } from './shape';

/** Colours and faces of a drawing on paper. */
export interface PaperStyle {
  colours: Record<Ink, string>;
  figureFace: string;
  labelFace: string;
}

export const dayPaper: PaperStyle = {
  colours: {
    ink: '#1B1F24',
    soft: '#5C6068',
    rule: '#D9D2C3',
    edge: '#8E8777',
    sheet: '#FFFFFF',
    oxide: '#B5401F',
    verdigris: '#226457',
    amber: '#7F5700',
  },
  figureFace: 'JetBrains Mono',
  labelFace: 'Barlow Condensed',
};

const escapes: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
const escapeText = (text: string): string => text.replace(/[&<>"']/g, (character) => escapes[character] ?? character);
/** A thousandth of a unit is finer than any printer; more digits only make files differ. */
const short = (value: number): string => String(Math.round(value * 1000) / 1000);

function writeAttributes(attributes: Record<string, string | number | undefined>): string {
  return Object.entries(attributes)
    .filter(([, value]) => value !== undefined)
    .map(([name, value]) => ` ${name}="${typeof value === 'number' ? short(value) : escapeText(value ?? '')}"`)
    .join('');
}

export function writePoints(points: readonly Point[]): string {
  return points.map(([x, y]) => `${short(x)},${short(y)}`).join(' ');
}

function writeShape(shape: Shape, style: PaperStyle): string {
  const colour = (ink: Ink | undefined): string => (ink ? style.colours[ink] : 'none');
  switch (shape.kind) {
    case 'rectangle':
      return `<rect${writeAttributes({ x: shape.x, y: shape.y, width: shape.width, height: shape.height, fill: colour(shape.fill), 'fill-opacity': shape.fillOpacity, stroke: colour(shape.stroke), 'stroke-width': shape.strokeWidth })}/>`;
    case 'line':
      return `<line${writeAttributes({ x1: shape.from[0], y1: shape.from[1], x2: shape.to[0], y2: shape.to[1], stroke: colour(shape.stroke), 'stroke-width': shape.strokeWidth, 'stroke-dasharray': shape.dash?.join(' ') })}/>`;
    case 'polygon':
      return `<polygon${writeAttributes({ points: writePoints(shape.points), fill: colour(shape.fill), stroke: colour(shape.outline), 'stroke-width': shape.outline ? 1 : undefined })}/>`;
    case 'text':
      return `<text${writeAttributes({ x: shape.at[0], y: shape.at[1], 'text-anchor': shape.anchor, 'font-family': shape.face === 'figure' ? style.figureFace : style.labelFace, 'font-size': shape.size, 'font-weight': shape.bold ? 600 : undefined, fill: colour(shape.fill) })}>${escapeText(shape.text)}</text>`;
  }
}

/** A picture as a whole SVG document, for paper and for mail. */
export function writeSvg(picture: Picture, style: PaperStyle = dayPaper): string {
  const body = picture.shapes.map((shape) => writeShape(shape, style)).join('');
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${short(picture.width)} ${short(picture.height)}" width="${short(picture.width)}" height="${short(picture.height)}" role="img"><title>${escapeText(picture.alternative)}</title>${body}</svg>`;
}

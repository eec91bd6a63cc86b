/* Texts of a mesh as exporters write them. */

/** Writes a number: `1.234567e+01`. */
export type NumberWriter = (value: number) => string;

/** A C program's `%.6e`: seven digits, and two at least of the exponent. */
export const sevenDigits: NumberWriter = (value) => value.toExponential(6).replace(/e([+-])(\d)$/, 'e$10$2');
/** Seventeen digits, which tell any two numbers apart. */
export const seventeenDigits: NumberWriter = (value) => value.toExponential(16).replace(/e([+-])(\d)$/, 'e$10$2');

const encode = (lines: string[]): Uint8Array<ArrayBuffer> => new Uint8Array(new TextEncoder().encode(`${lines.join('\n')}\n`));

export function writeStlText(corners: Float64Array, write: NumberWriter): Uint8Array<ArrayBuffer> {
  const lines = ['solid sphere'];
  const three = (values: ArrayLike<number>, at: number): string => [0, 1, 2].map((k) => write(values[at + k] ?? 0)).join(' ');
  for (let at = 0; at < corners.length; at += 9) {
    lines.push(`  facet normal ${three(findNormal(corners, at), 0)}`, '    outer loop');
    for (let corner = 0; corner < 9; corner += 3) lines.push(`      vertex ${three(corners, at + corner)}`);
    lines.push('    endloop', '  endfacet');
  }
  return encode([...lines, 'endsolid sphere']);
}

/** Each vertex once, then the triangles. `references` puts a texture place and a normal of each vertex beside it, as modelling programs do. */
export function writeObjText(corners: Float64Array, write: NumberWriter, references: boolean): Uint8Array<ArrayBuffer> {
  const numbers = new Map<string, number>();
  const lines: string[] = ['# a sphere', 'o sphere'];
  const faces: string[] = [];
  const normals: string[] = [];
  const places: string[] = [];
  for (let at = 0; at < corners.length; at += 9) {
    const named = [0, 3, 6].map((corner) => {
      const [x = 0, y = 0, z = 0] = corners.subarray(at + corner, at + corner + 3);
      const line = `v ${write(x)} ${write(y)} ${write(z)}`;
      let number = numbers.get(line);
      if (number === undefined) {
        number = numbers.size + 1;
        numbers.set(line, number);
        lines.push(line);
        normals.push(`vn ${(x / 50).toFixed(4)} ${(y / 50).toFixed(4)} ${(z / 50).toFixed(4)}`);
        places.push(`vt ${(0.5 + x / 100).toFixed(6)} ${(0.5 + y / 100).toFixed(6)}`);
      }
      return references ? `${number}/${number}/${number}` : String(number);
    });
    faces.push(`f ${named.join(' ')}`);
  }
  return encode(references ? [...lines, ...places, ...normals, ...faces] : [...lines, ...faces]);
}

function findNormal(corners: Float64Array, at: number): [number, number, number] {
  const c = (k: number): number => corners[at + k] ?? 0;
  const ex = c(3) - c(0), ey = c(4) - c(1), ez = c(5) - c(2);
  const fx = c(6) - c(0), fy = c(7) - c(1), fz = c(8) - c(2);
  const nx = ey * fz - ez * fy, ny = ez * fx - ex * fz, nz = ex * fy - ey * fx;
  const length = Math.sqrt(nx * nx + ny * ny + nz * nz) || 1;
  return [nx / length, ny / length, nz / length];
}

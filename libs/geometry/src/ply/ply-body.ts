import { spellCount, spellCounted, type MeshErrorCode } from '../mesh-error';
import { isCoordinate, showText } from '../mesh-words';
import type { PolygonMesh } from '../polygon-mesh';
import type { PlyElement, PlyHeader, PlyProperty, PlyType } from './ply-header';

/** Takes the numbers of a PLY file one by one, whatever they are written in. */
export interface PlyBody {
  take(value: number): void;
  /** How the next number is stored. */
  readonly type: PlyType;
  /** No number is missing of the element that was begun last. */
  readonly betweenRows: boolean;
  readonly done: boolean;
  /** What the next number belongs to: `vertex 3 of 8`. */
  describe(): string;
}

/** What a property is for: a coordinate (0 to 2), the corners of a polygon, or nothing. */
type Role = 0 | 1 | 2 | 'corners' | 'none';

const cornerNames = new Set(['vertex_indices', 'vertex_index']);
const isWhole = ({ type }: PlyProperty): boolean => type !== 'float' && type !== 'double';

/** Which of an element's properties count. */
function findRoles({ name, properties }: PlyElement): Role[] {
  return properties.map((property): Role => {
    if (name === 'face' && property.countType !== null && cornerNames.has(property.name) && isWhole(property)) return 'corners';
    const axis = name === 'vertex' && property.countType === null ? ['x', 'y', 'z'].indexOf(property.name) : -1;
    return axis === 0 || axis === 1 || axis === 2 ? axis : 'none';
  });
}

/** Hands a PLY file's vertices and faces to a mesh. `refuse` throws a MeshError of the place that is being read. */
export function createPlyBody({ elements }: PlyHeader, mesh: PolygonMesh, refuse: (code: MeshErrorCode, message: string) => never): PlyBody {
  // An element without properties has no numbers.
  const rows = elements.filter(({ count, properties }) => count > 0 && properties.length > 0);
  const roles = rows.map(findRoles);
  const point: [number, number, number] = [0, 0, 0];
  let element = 0;
  let row = 0;
  let property = 0;
  // Values to come of the list that was begun.
  let left = 0;
  let inList = false;

  const current = (): PlyProperty | undefined => rows[element]?.properties[property];
  const isList = (): boolean => typeof current()?.countType === 'string';
  const describe = (): string => `${showText(rows[element]?.name ?? '', 24)} ${spellCount(row + 1)} of ${spellCount(rows[element]?.count ?? 0)}`;

  function take(value: number): void {
    const role = roles[element]?.[property] ?? 'none';
    if (inList) {
      if (role === 'corners') mesh.addCorner(checkCorner(value));
      left -= 1;
    } else if (isList()) beginList(value, role);
    else if (role !== 'none' && role !== 'corners') point[role] = checkCoordinate(value);
    inList = left > 0;
    if (!inList) endProperty();
  }

  function beginList(value: number, role: Role): void {
    if (!Number.isInteger(value) || value < 0) refuse('syntax-invalid', `The ${describe()} of this PLY mesh has a list of “${value}” values. Export the mesh again.`);
    left = value;
    if (role === 'corners') mesh.beginPolygon();
  }

  function checkCoordinate(value: number): number {
    if (isCoordinate(value)) return value;
    const what = Number.isNaN(value) ? 'a coordinate that is not a number' : 'a coordinate that is infinite or beyond 3.4e38';
    return refuse('number-not-finite', `The ${describe()} of this PLY mesh has ${what}. Export the mesh again.`);
  }

  function checkCorner(value: number): number {
    if (Number.isInteger(value) && value >= 0 && value < mesh.vertexCount) return value;
    return refuse('vertex-missing', `The ${describe()} of this PLY mesh has the corner “${value}”, but its vertices are numbered from 0 to ${spellCount(mesh.vertexCount - 1)}. Export the mesh again.`);
  }

  function endProperty(): void {
    property += 1;
    if (property === rows[element]?.properties.length) endRow();
  }

  function endRow(): void {
    const name = rows[element]?.name;
    if (name === 'vertex') mesh.addVertex(point[0], point[1], point[2]);
    else if (name === 'face') {
      if (mesh.corners < 3) refuse('syntax-invalid', `The ${describe()} of this PLY mesh has ${spellCounted(mesh.corners, 'corner')}; a polygon needs three at least. Export the mesh again.`);
      mesh.endPolygon();
    }
    property = 0;
    row += 1;
    if (row === rows[element]?.count) {
      row = 0;
      element += 1;
    }
  }

  return {
    take,
    get type() {
      const next = current();
      return (inList ? next?.type : (next?.countType ?? next?.type)) ?? 'uchar';
    },
    get betweenRows() {
      return property === 0 && !inList;
    },
    get done() {
      return element === rows.length;
    },
    describe,
  };
}

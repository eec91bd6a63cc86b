import { growArray } from '../grow-array';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, type MeshErrorCode } from '../mesh-error';
import { showText } from '../mesh-words';
import { tooManyFacets } from '../format-reader';
import { findPartName } from './find-root-part';
import type { ModelObject, ModelPart, Reference } from './model-part';
import { parseNumber, parseTransform, parseUnit, parseWhole } from './model-values';
import { readPrefixes, type Prefixes } from './namespaces';
import { createXmlScanner, type Attributes, type XmlScanner } from './scan-xml';

/** Where one is in a model; what is below `passed-over` means nothing here. */
type Place = 'model' | 'resources' | 'basematerials' | 'object' | 'mesh' | 'vertices' | 'vertex' | 'triangles' | 'triangle' | 'components' | 'build' | 'passed-over';

/** Vertices and triangles of all parts that were read, which together have a limit. */
export interface ModelTotals {
  vertices: number;
  triangles: number;
}

export interface ModelPartReader {
  push(bytes: Uint8Array): void;
  finish(): ModelPart;
}

/** More different ones would be colours. */
const mostMaterialsOfObject = 1000;
/** Elements of extensions that are bodies without being facets. */
const otherBodies = /(^|:)(beamlattice|booleanshape|levelset|displacementmesh|mirrormesh|slicestack)$/;

/** Reads one model of a 3MF file: XML after its core specification. Throws a MeshError with the line for what does not belong there. */
export function createModelPartReader(name: string, totals: ModelTotals, limits: ReadingLimits): ModelPartReader {
  const part: ModelPart = { name, unit: 'mm', objects: new Map(), items: [], materialNames: new Map() };
  const scanner: XmlScanner = createXmlScanner(name, limits, { open, close: () => void places.pop() });
  const places: Place[] = [];
  let prefixes: Prefixes | undefined;
  let object: ModelObject | undefined;
  let objectMaterial: { group: string | undefined; place: string | undefined } = { group: undefined, place: undefined };
  let group = { id: '', count: 0 };

  function open(element: string, attributes: Attributes): void {
    if (prefixes === undefined) openModel(element, attributes);
    else places.push(enter(places.at(-1) ?? 'passed-over', element, attributes, prefixes));
  }

  function openModel(element: string, attributes: Attributes): void {
    prefixes = readPrefixes(element, attributes);
    if (prefixes === undefined) return refuse('is no model of the 3MF core specification');
    if (prefixes.unread !== undefined) refuse(`requires “${showText(prefixes.unread, 80)}”, which is not read`);
    part.unit = parseUnit(attributes['unit']) ?? refuse('has a unit that 3MF does not have');
    places.push('model');
  }

  function enter(place: Place, element: string, attributes: Attributes, known: Prefixes): Place {
    if (place === 'passed-over') return place;
    if (otherBodies.test(element)) refuse('has a body that is not made of triangles, which is not read');
    const child = attributes['xmlns'] === undefined ? known.findCoreName(element) : undefined;
    switch (`${place} ${child}`) {
      case 'model resources':
      case 'model build':
        return child as Place;
      case 'resources basematerials':
        group = { id: attributes['id'] ?? '', count: 0 };
        return 'basematerials';
      case 'basematerials base':
        part.materialNames.set(`${group.id}/${group.count++}`, attributes['name'] ?? '');
        return 'passed-over';
      case 'resources object':
        openObject(attributes);
        return 'object';
      case 'object mesh':
      case 'object components':
      case 'mesh vertices':
      case 'mesh triangles':
        return child as Place;
      case 'components component':
        object?.components.push(readReference(attributes, known));
        return 'passed-over';
      case 'vertices vertex':
        addVertex(object as ModelObject, attributes);
        return 'vertex';
      case 'triangles triangle':
        addTriangle(object as ModelObject, attributes);
        return 'triangle';
      case 'build item':
        part.items.push(readReference(attributes, known));
        return 'passed-over';
      default:
        return 'passed-over';
    }
  }

  function openObject(attributes: Attributes): void {
    const id = parseWhole(attributes['id']) ?? refuse('has an object without a number');
    if (part.objects.has(id)) refuse(`has the object ${id} for a second time`);
    objectMaterial = { group: attributes['pid'], place: attributes['pindex'] };
    const materials = new Set<string>();
    object = { id, type: attributes['type'] ?? 'model', line: scanner.line, vertices: new Float64Array(0), vertexCount: 0, triangles: new Uint32Array(0), triangleCount: 0, components: [], materials };
    if (objectMaterial.group !== undefined) materials.add(`${objectMaterial.group}/${objectMaterial.place ?? '0'}`);
    part.objects.set(id, object);
  }

  function addVertex(to: ModelObject, attributes: Attributes): void {
    totals.vertices += 1;
    if (totals.vertices > limits.maximumVertices) refuseAs('too-many-vertices', `comes after ${spellCount(limits.maximumVertices)} vertices, the most that can be examined here. Reduce the mesh or split it into parts`);
    const at = 3 * to.vertexCount;
    if (to.vertices.length < at + 3) to.vertices = growArray(to.vertices, Math.max(at + 3, 24), 3 * limits.maximumVertices);
    to.vertices[at] = coordinate(attributes['x']);
    to.vertices[at + 1] = coordinate(attributes['y']);
    to.vertices[at + 2] = coordinate(attributes['z']);
    to.vertexCount += 1;
  }

  function coordinate(text: string | undefined): number {
    const number = parseNumber(text);
    if (number !== undefined) return number;
    if (text === undefined) return refuse('has a vertex without x, y or z');
    const finite = /^\s*[+-]?(nan|inf|infinity|\d[\d.]*e\+?\d+)\s*$/i.test(text) ? 'number-not-finite' : 'number-invalid';
    return refuseAs(finite, `has the coordinate “${showText(text, 24)}”, which is not a number, or not below 3.4e38. Export it again`);
  }

  function addTriangle(to: ModelObject, attributes: Attributes): void {
    totals.triangles += 1;
    if (totals.triangles > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, '3mf', { line: scanner.line });
    const at = 3 * to.triangleCount;
    if (to.triangles.length < at + 3) to.triangles = growArray(to.triangles, Math.max(at + 3, 24), 3 * limits.maximumFacets);
    to.triangles[at] = corner(to, attributes['v1']);
    to.triangles[at + 1] = corner(to, attributes['v2']);
    to.triangles[at + 2] = corner(to, attributes['v3']);
    to.triangleCount += 1;
    const first = attributes['p1'];
    if (first !== undefined && to.materials.size < mostMaterialsOfObject) to.materials.add(`${attributes['pid'] ?? objectMaterial.group ?? ''}/${first}`);
  }

  function corner(of: ModelObject, text: string | undefined): number {
    const vertex = parseWhole(text);
    if (vertex !== undefined && vertex < of.vertexCount) return vertex;
    return refuseAs('vertex-missing', `has the corner “${showText(text ?? '', 24)}”, but the vertices of its object are numbered from 0 to ${spellCount(of.vertexCount - 1)}. Export it again`);
  }

  function readReference(attributes: Attributes, known: Prefixes): Reference {
    const objectId = parseWhole(attributes['objectid']) ?? refuse('refers to an object without saying its number');
    const affine = parseTransform(attributes['transform']) ?? refuse('has a transform that is not twelve numbers');
    const path = known.findPath(attributes);
    const other = path === undefined ? undefined : (findPartName(path) ?? refuse('refers to a place that leads out of the file'));
    return { objectId, affine, part: other, line: scanner.line };
  }

  function refuse(what: string): never {
    return refuseAs('syntax-invalid', `${what}. Export it again`);
  }

  function refuseAs(code: MeshErrorCode, what: string): never {
    throw new MeshError(code, `Line ${spellCount(scanner.line)} of ${showText(name, 60)} in this 3MF file ${what}.`, { line: scanner.line });
  }

  return {
    push: (bytes) => scanner.push(bytes),
    finish() {
      scanner.finish();
      return part;
    },
  };
}

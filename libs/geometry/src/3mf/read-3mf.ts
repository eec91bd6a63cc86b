import { listMaterialNames } from '../declared-materials';
import type { FacetSink } from '../facet-batch';
import { createFacetWriter } from '../facet-writer';
import { noRemarks, tooManyFacets, type FileRemarks, type FormatReader } from '../format-reader';
import { checkPlacedFacets, createByteStore } from '../keep-bytes';
import type { ReadingLimits } from '../limits';
import { MeshError } from '../mesh-error';
import { showText } from '../mesh-words';
import { openZip, type ZipArchive } from '../zip/open-zip';
import { findRootPart } from './find-root-part';
import type { ModelPart } from './model-part';
import { placeObjects } from './place-objects';
import { createModelPartReader, type ModelTotals } from './read-model-part';

/**
 * Reads the facets of a 3MF file (core specification 1.x, and objects in other parts by the production extension), pushed in chunks of any size. The archive is kept until
 * its end has come, where its directory is. Facets are those of the objects that are built, where they are placed, in the unit of the model.
 */
export function createThreeMfReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const store = createByteStore('3mf', limits.maximumKeptBytes);
  let facets = 0;
  return {
    push: (bytes) => store.push(bytes),
    finish() {
      const writer = createFacetWriter('3mf', limits.maximumFacets, sink, () => ({ byte: 0 }));
      const remarks = readArchive(openZip(store.finish(), limits), limits, (placed) => {
        placed.write(writer);
        writer.finish();
      });
      facets = writer.count;
      return remarks;
    },
    get facetsRead() {
      return facets;
    },
  };
}

function readArchive(archive: ZipArchive, limits: ReadingLimits, write: (placed: ReturnType<typeof placeObjects>) => void): FileRemarks {
  const rootName = findRootPart(archive, limits);
  const totals: ModelTotals = { vertices: 0, triangles: 0 };
  const parts = new Map<string, ModelPart>();

  function getPart(name: string): ModelPart {
    const known = parts.get(name.toLowerCase());
    if (known !== undefined) return known;
    const reader = createModelPartReader(name, totals, limits);
    archive.read(name, (bytes) => reader.push(bytes));
    const part = reader.finish();
    const unit = parts.get(rootName.toLowerCase())?.unit ?? part.unit;
    if (part.unit !== unit) throw new MeshError('syntax-invalid', `In this 3MF file, ${showText(name, 60)} is in another unit than the model that it belongs to. Export it again.`, { line: 1 });
    parts.set(name.toLowerCase(), part);
    return part;
  }

  const root = getPart(rootName);
  const placed = placeObjects(root, getPart, limits);
  if (placed.facets > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, '3mf', { byte: 0 });
  checkPlacedFacets(placed.facets, archive.expandedBytes, '3mf', limits);
  write(placed);
  return {
    ...noRemarks(),
    solids: Math.max(1, placed.bodies),
    declaredUnit: root.unit,
    declaredMaterials: listMaterialNames(placed.materials),
    leftOut: placed.leftOut.map((type) => `objects of type “${showText(type, 24)}”`),
  };
}

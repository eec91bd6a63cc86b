import { checkDeclaredFacets, facetBytes, headerBytes } from './detect-format';
import type { NotFinite, PackedFacetSink } from './packed-facets';
import { batchFacets, createFacetBatch, flushFacets, type FacetSink } from './facet-batch';
import { noRemarks, tooManyFacets, type FormatReader } from './format-reader';
import { findingFacets } from './measurement';
import { MeshError, spellCount } from './mesh-error';

/**
 * Reads the facets of a binary STL file, pushed in chunks of any size: little-endian, 84 bytes of header, then for each facet a normal,
 * three corners and a 16-bit attribute. Whether the declared number of facets fits the size of the file is checked at the end, since the size of
 * a packed one is not known before; fewer bytes than a facet's after the last are passed over.
 *
 * @param packed takes the facets as they are, in place of `sink`; then nothing is noticed beside them
 */
export function createBinaryStlReader(facets: number, maximumFacets: number, sink: FacetSink, packed?: PackedFacetSink): FormatReader {
  const batch = createFacetBatch();
  const carry = new Uint8Array(facetBytes);
  const carryView = new DataView(carry.buffer);
  const remarks = noRemarks();
  const attributes = remarks.nonzeroAttributes;
  const wanted = Math.min(facets, maximumFacets);
  let carried = 0;
  let toSkip = headerBytes;
  let read = 0;
  let received = 0;

  function readFacet(view: DataView, at: number): void {
    const { corners, normals } = batch;
    const corner = 9 * batch.count;
    const normal = 3 * batch.count;
    for (let k = 0; k < 3; k++) normals[normal + k] = view.getFloat32(at + 4 * k, true);
    let finite = 0;
    for (let k = 0; k < 9; k++) {
      const coordinate = view.getFloat32(at + 12 + 4 * k, true);
      corners[corner + k] = coordinate;
      // 0 for every finite number, NaN otherwise.
      finite += coordinate - coordinate;
    }
    if (finite !== 0) refuseFacet(view, at);
    if (view.getUint16(at + 48, true) !== 0) {
      attributes.count += 1;
      if (attributes.facets.length < findingFacets) attributes.facets.push(read);
    }
    batch.count += 1;
    read += 1;
    if (batch.count === batchFacets) flushFacets(batch, sink);
  }

  function takeFacets(bytes: Uint8Array, view: DataView, at: number, count: number): void {
    if (packed === undefined) for (let n = 0; n < count; n++) readFacet(view, at + n * facetBytes);
    else {
      refuseNotFinite(packed.add(bytes, at, count));
      read += count;
    }
  }

  function refuseNotFinite(found: NotFinite | undefined): void {
    if (found !== undefined) throw refuseCoordinate(found);
  }

  function refuseFacet(view: DataView, at: number): never {
    for (let k = 0; k < 9; k++) {
      const coordinate = view.getFloat32(at + 12 + 4 * k, true);
      if (Number.isFinite(coordinate)) continue;
      throw refuseCoordinate({ facet: read, place: k, coordinate });
    }
    throw new MeshError('number-not-finite', `Facet ${spellCount(read + 1)} has a coordinate that is not finite.`);
  }

  function refuseCoordinate({ facet, place, coordinate }: NotFinite): MeshError {
    const which = `Corner ${Math.floor(place / 3) + 1} of facet ${spellCount(facet + 1)} (of ${spellCount(facets)})`;
    const what = Number.isNaN(coordinate) ? 'a coordinate that is not a number' : 'an infinite coordinate';
    return new MeshError('number-not-finite', `${which} has ${what}. Export the mesh again.`, { byte: headerBytes + facetBytes * facet + 12 + 4 * place });
  }

  function push(bytes: Uint8Array): void {
    received += bytes.length;
    let at = Math.min(toSkip, bytes.length);
    toSkip -= at;
    if (carried > 0) {
      const taken = Math.min(facetBytes - carried, bytes.length - at);
      carry.set(bytes.subarray(at, at + taken), carried);
      carried += taken;
      at += taken;
      if (carried < facetBytes) return;
      carried = 0;
      if (read < wanted) takeFacets(carry, carryView, 0, 1);
    }
    const whole = Math.min(wanted - read, Math.floor((bytes.length - at) / facetBytes));
    if (whole > 0) {
      takeFacets(bytes, new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength), at, whole);
      at += whole * facetBytes;
    }
    if (at === bytes.length) return;
    if (read === maximumFacets && facets > maximumFacets) throw tooManyFacets(maximumFacets, 'stl-binary', { byte: headerBytes + facetBytes * maximumFacets });
    if (read < wanted) {
      carry.set(bytes.subarray(at));
      carried = bytes.length - at;
    }
  }

  return {
    push,
    finish() {
      if (packed === undefined) flushFacets(batch, sink);
      else refuseNotFinite(packed.finish());
      remarks.trailingBytes = checkDeclaredFacets(facets, received);
      return remarks;
    },
    get facetsRead() {
      return read;
    },
  };
}

import type { ReadingLimits } from '../limits';
import { MeshError } from '../mesh-error';
import type { ZipArchive } from '../zip/open-zip';
import { createXmlScanner } from './scan-xml';

const relationships = '_rels/.rels';
const modelType = 'http://schemas.microsoft.com/3dmanufacturing/2013/01/3dmodel';

/** The name of a part in the archive: how a document of it writes it, without the first slash. Undefined where it leads out of the archive. */
export function findPartName(reference: string): string | undefined {
  const name = reference.replace(/^\//, '');
  return name === '' || /(^|\/)\.{1,2}(\/|$)|[\\:]|^\//.test(name) ? undefined : name;
}

/** The part of a 3MF file that holds its model. Throws a MeshError where the archive is no 3MF file. */
export function findRootPart(archive: ZipArchive, limits: ReadingLimits): string {
  const notThreeMf = (): never => {
    throw new MeshError('format-unknown', 'This is a ZIP archive, but no 3MF file: it names no 3D model. Unpack it, and give the meshes in it.', { byte: 0 });
  };
  if (!archive.has(relationships)) notThreeMf();
  const targets: string[] = [];
  const scanner = createXmlScanner(relationships, limits, {
    open(name, attributes) {
      if (name.replace(/^.*:/, '') !== 'Relationship' || attributes['Type'] !== modelType) return;
      targets.push(attributes['Target'] ?? '');
    },
    close: () => undefined,
  });
  archive.read(relationships, (bytes) => scanner.push(bytes));
  scanner.finish();
  const [target] = targets;
  if (target === undefined) return notThreeMf();
  const part = findPartName(target);
  if (part === undefined) throw new MeshError('syntax-invalid', `This 3MF file has its model at a place that leads out of it. Export it again.`, { line: 1 });
  return part;
}

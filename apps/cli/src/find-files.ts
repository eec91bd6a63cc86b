import { readdir, stat } from 'node:fs/promises';
import path from 'node:path';
import { UsageError } from './command-line';

/** Names of files that are taken from a folder. A file that is named itself is read whatever its name. */
const meshName = /\.(?:stl|obj|ply|off|3mf|glb|gltf|(?:stl|obj|ply|off|gltf)\.gz)$/i;

/**
 * The files that are named, and the meshes in the folders that are, with what lies below them, each folder in the order of its names. Links within folders are not followed.
 * @throws UsageError where a path doesn't exist
 */
export async function findFiles(paths: readonly string[]): Promise<string[]> {
  const found: string[] = [];
  for (const place of paths) {
    const kind = await stat(place).catch(() => undefined);
    if (kind === undefined) throw new UsageError(`There is no ${place}.`);
    if (kind.isDirectory()) await addFolder(place, found);
    else found.push(place);
  }
  if (found.length === 0) throw new UsageError(`There is no mesh file in ${paths.join(', ')}: names that end in .stl, .obj, .ply, .off, .3mf, .glb or .gltf.`);
  return [...new Set(found)];
}

async function addFolder(folder: string, found: string[]): Promise<void> {
  const entries = await readdir(folder, { withFileTypes: true });
  entries.sort((one, two) => (one.name < two.name ? -1 : 1));
  for (const entry of entries) {
    const place = path.join(folder, entry.name);
    if (entry.isDirectory()) await addFolder(place, found);
    else if (entry.isFile() && meshName.test(entry.name)) found.push(place);
  }
}

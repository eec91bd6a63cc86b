import { dropMeshEnding } from '@masswright/contracts';

/** A first name for a part from its file's: without folders, endings and what can't be seen. */
export function nameOfPart(fileName: string): string {
  const name = dropMeshEnding(fileName).trim();
  return name === '' ? 'Unnamed part' : name;
}

import { cleanFileName } from '@masswright/contracts';

/** A first name for a part from its file's: without folders, endings and what can't be seen. */
export function nameOfPart(fileName: string): string {
  const name = cleanFileName(fileName).replace(/\.gz$/i, '').replace(/\.(stl|obj)$/i, '').trim();
  return name === '' ? 'Unnamed part' : name;
}

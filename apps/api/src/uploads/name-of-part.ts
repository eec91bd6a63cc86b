const longestName = 200;
// Control characters, and the marks that turn the direction of text and so can make one name look like another.
const invisible = /[\p{Cc}\u200e\u200f\u061c\u202a-\u202e\u2066-\u2069]/gu;

/** A first name for a part from its file's: without folders, ending and what can't be seen. */
export function nameOfPart(fileName: string): string {
  const base = fileName.split(/[/\\]/).at(-1) ?? '';
  const name = base.replace(invisible, '').replace(/\.(stl|gz)$/i, '').trim().slice(0, longestName).trim();
  return name === '' ? 'Unnamed part' : name;
}

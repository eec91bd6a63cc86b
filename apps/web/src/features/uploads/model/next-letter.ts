/** The letter of the revision that follows: A, B … Z, AA. */
export function nextLetter(letter: string): string {
  const last = letter.at(-1) ?? '';
  if (last === '') return 'A';
  if (last !== 'Z') return `${letter.slice(0, -1)}${String.fromCharCode(last.charCodeAt(0) + 1)}`;
  return `${nextLetter(letter.slice(0, -1))}A`;
}

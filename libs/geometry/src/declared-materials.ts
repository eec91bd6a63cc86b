/** The most names of materials that are kept of one file. */
const mostMaterials = 20;
const longestName = 200;

/** Names as they may be stored and shown: no control characters, no halves of characters, no blanks around; none twice, and none that is empty. */
export function listMaterialNames(names: Iterable<string>): string[] {
  const kept = new Set<string>();
  for (const name of names) {
    if (kept.size === mostMaterials) break;
    const clean = name.slice(0, longestName).replace(/[\p{Cc}\p{Cs}\ufffd]+/gu, ' ').trim();
    if (clean !== '') kept.add(clean);
  }
  return [...kept];
}

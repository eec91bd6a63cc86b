import type { Material } from '@masswright/contracts';

/** A name in a file, and the entries of the library that it may mean. */
export interface DeclaredMaterial {
  name: string;
  proposals: Material[];
}

const mostProposals = 3;
const fold = (text: string): string => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().replace(/[^a-z0-9]+/g, ' ').trim();

/** Those of exactly that name, else those whose name holds all its words; none where so many do that the name says little. */
function propose(name: string, materials: readonly Material[]): Material[] {
  const words = fold(name);
  if (words === '') return [];
  const same = materials.filter((material) => fold(material.name) === words);
  if (same.length > 0) return same.slice(0, mostProposals);
  const holding = materials.filter((material) => words.split(' ').every((word) => fold(material.name).split(' ').includes(word)));
  return holding.length <= mostProposals ? holding : [];
}

/** The names of materials that a file gives, each with what the library has of that name: a proposal, and the person's choice. */
export function findDeclaredMaterials(names: readonly string[], materials: readonly Material[]): DeclaredMaterial[] {
  const present = materials.filter(({ archivedAt }) => archivedAt === null);
  return [...new Set(names.map((name) => name.trim()).filter(Boolean))].map((name) => ({ name, proposals: propose(name, present) }));
}

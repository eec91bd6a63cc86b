import type { StarterMaterial } from './starter-material';
import { starterMetals } from './starter-metals';
import { starterOthers } from './starter-others';

export type { StarterMaterial } from './starter-material';

/** The materials that every installation has, group by group. Their ids are stored in settings and never change their meaning. */
export const starterLibrary: readonly StarterMaterial[] = [...starterMetals, ...starterOthers];

const byId = new Map(starterLibrary.map((material) => [material.id, material]));

/** A material of the starter library; undefined where there is none of that id. */
export function findStarterMaterial(id: string): StarterMaterial | undefined {
  return byId.get(id);
}

/** By what names are compared: two that differ in letter case or spaces are one. */
export function materialNameKey(name: string): string {
  return name.normalize('NFC').trim().replace(/\s+/g, ' ').toLowerCase();
}

const byName = new Map(starterLibrary.map((material) => [materialNameKey(material.name), material]));

/** The material of the starter library that has a name, letter case left aside. */
export function findStarterMaterialByName(name: string): StarterMaterial | undefined {
  return byName.get(materialNameKey(name));
}

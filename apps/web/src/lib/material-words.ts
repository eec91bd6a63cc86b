import { materialGroupNames, type Material, type MaterialGroup } from '@masswright/contracts';
import { thinSpace } from '@masswright/units';

export { materialGroupNames };

/** A number with the digits that it needs and no more, thousands set off. */
export function writePlain(value: number, digits: number): string {
  const [integer = '', ...rest] = String(Number(value.toPrecision(digits))).split('.');
  return [/^-?\d+$/.test(integer) ? integer.replace(/\B(?=(\d{3})+$)/g, thinSpace) : integer, ...rest].join('.');
}

/** "2 700 ± 27 kg/m³"; without a spread the density alone. A spread is an estimate: two digits of it are enough. */
export function writeSpreadDensity({ densityKgM3, densitySpreadKgM3 }: { densityKgM3: number; densitySpreadKgM3: number | null }): string {
  const spread = densitySpreadKgM3 === null ? '' : ` ± ${writePlain(densitySpreadKgM3, 2)}`;
  return `${writePlain(densityKgM3, 6)}${spread} kg/m³`;
}

const fold = (text: string): string => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/** Those whose name or family holds every word of a text, in their order. */
export function filterMaterials<Item extends Pick<Material, 'name' | 'group'>>(materials: readonly Item[], text: string): Item[] {
  const words = fold(text).split(/\s+/).filter(Boolean);
  if (words.length === 0) return [...materials];
  return materials.filter(({ name, group }) => {
    const searched = fold(`${name} ${materialGroupNames[group]}`);
    return words.every((word) => searched.includes(word));
  });
}

/** By family in the order of the families, within one by name. */
export function groupMaterials<Item extends Pick<Material, 'name' | 'group'>>(materials: readonly Item[]): { group: MaterialGroup; name: string; items: Item[] }[] {
  const order = Object.keys(materialGroupNames) as MaterialGroup[];
  return order
    .map((group) => ({
      group,
      name: materialGroupNames[group],
      items: materials.filter((material) => material.group === group).sort((one, other) => one.name.localeCompare(other.name, 'en', { numeric: true })),
    }))
    .filter(({ items }) => items.length > 0);
}

import type { Setting, StatementRecord } from '@masswright/contracts';
import type { Tone } from '../../../components/status-tag';
import { writePlain, writeSpreadDensity } from '../../../lib/material-words';
import { pickDensity } from './typed-density';

/** How a weighed mass stands to the material, in a word and in sentences that say what follows. */
export function describeWeighing(weighing: StatementRecord['weighing'] | undefined, setting: Setting): { tone: Tone; word: string; words: string } {
  if (!weighing) return { tone: 'neutral', word: 'Not compared', words: 'It sets the density once the mesh has a volume and its unit is stated.' };
  const implied = `${writePlain(weighing.impliedDensityKgM3, 4)} kg/m³`;
  const density = pickDensity(setting);
  const named = `${setting.material?.name ?? 'the material'}${density ? ` (${writeSpreadDensity(density)})` : ''}`;
  switch (weighing.verdict) {
    case 'agrees':
      return { tone: 'agreement', word: 'Agrees', words: `It implies ${implied}, within what ${named} can have: the weight sets the density.` };
    case 'unchecked':
      return { tone: 'doubt', word: 'Unchecked', words: `It implies ${implied}, and sets the density. No material is named that it could be held against.` };
    case 'disagrees':
      return {
        tone: 'doubt',
        word: 'Disagrees',
        words: `It implies ${implied}, outside of what ${named} can have. So the part is not a uniform body of that material: hollow, filled, or of another. Its tensor can't be scaled from the weight; mass and moments stay those of the material.`,
      };
  }
}

/** The density that the mass is by, where the weight and not the field of the density says it; undefined where the field does. */
export function describeDensityInForce(statement: Pick<StatementRecord, 'densityKgM3' | 'weighing'> | undefined, { densityKgM3 }: Pick<Setting, 'densityKgM3'>): string | undefined {
  const byWeight = statement?.weighing && statement.weighing.verdict !== 'disagrees' ? statement.densityKgM3 : null;
  if (byWeight === null || byWeight === densityKgM3) return undefined;
  return `In force: ${writePlain(byWeight, 4)} kg/m³, by the weight.`;
}

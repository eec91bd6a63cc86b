import { Button } from '@blueprintjs/core';
import type { Material, Setting, StatementRecord } from '@masswright/contracts';
import { MaterialPicker } from '../../../components/material-picker';
import { TypedField } from '../../../components/typed-field';
import { writePlain, writeSpreadDensity } from '../../../lib/material-words';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { describeMassChange, describeTypedDensity, pickDensity, readTypedDensity, writeTypedDensity } from '../model/typed-density';
import { describeDensityInForce } from '../model/weighing-words';
import { DeclaredMaterials } from './declared-materials';
import { Fact } from './section';

interface DensityFactsProps {
  editor: SettingEditor;
  state: SettingEditorState;
  canEdit: boolean;
  materials: readonly Material[];
  statement: StatementRecord | undefined;
  /** Names of materials that the file gives. */
  declared: readonly string[];
}

/** What a setting takes over of a material: its name, and the density that it has at this moment. */
const takeMaterial = ({ id, name, densityKgM3, densitySpreadKgM3 }: Material): Partial<Setting> => ({ material: { id, name }, densityKgM3, densitySpreadKgM3 });

/** The library has another density by now than the setting was made with; what taking it would move is said before. */
function NewerDensity({ draft, materials, statement, canEdit, editor }: Pick<DensityFactsProps, 'materials' | 'statement' | 'canEdit' | 'editor'> & { draft: Setting }) {
  const present = materials.find(({ id }) => id === draft.material?.id);
  if (!present || draft.densityKgM3 === null || present.densityKgM3 === draft.densityKgM3) return null;
  const { massKg } = statement ?? {};
  // Where the weight sets the density, the material's moves no figure.
  const moves = typeof massKg === 'number' && statement?.densityKgM3 === draft.densityKgM3 ? describeMassChange(massKg, (massKg * present.densityKgM3) / draft.densityKgM3) : undefined;
  return (
    <p className="newer-density">
      {present.name} now has {writePlain(present.densityKgM3, 6)} kg/m³ in the library; this setting was made with {writePlain(draft.densityKgM3, 6)} kg/m³.
      {moves && ` Taking it moves the mass by ${moves}.`}{' '}
      {canEdit && (
        <Button size="small" className="screen-only" onClick={() => editor.change(takeMaterial(present))}>
          Take {writePlain(present.densityKgM3, 6)} kg/m³
        </Button>
      )}
    </p>
  );
}

/** Of what the part is: a material, or a typed density. */
export function DensityFacts({ editor, state, canEdit, materials, statement, declared }: DensityFactsProps) {
  const { draft } = state;
  const density = pickDensity(draft);
  const inForce = describeDensityInForce(statement, draft);
  return (
    <>
      {(canEdit || draft.material || declared.length > 0) && (
        <Fact name="Material">
          {canEdit ? (
            <MaterialPicker
              label="Material"
              materials={materials}
              value={draft.material}
              onChange={(material) => editor.change(material ? takeMaterial(material) : { material: null })}
            />
          ) : (
            (draft.material?.name ?? 'not stated')
          )}
          {draft.material === null && <DeclaredMaterials names={declared} materials={materials} onTake={canEdit ? (material) => editor.change(takeMaterial(material)) : undefined} />}
          <NewerDensity draft={draft} materials={materials} statement={statement} canEdit={canEdit} editor={editor} />
        </Fact>
      )}
      <Fact name="Density">
        {canEdit ? (
          <TypedField
            label="Density"
            value={density}
            write={writeTypedDensity}
            read={readTypedDensity}
            describe={(typed, text) => describeTypedDensity(typed, text) || (draft.material ? `of ${draft.material.name}; another one takes the name away` : '')}
            emptyHint="A material, or typed with its unit and spread, such as 2.7 g/cm3 ± 1 %: then there is a mass."
            placeholder="2.7 g/cm3 ± 1 %"
            onChange={(typed) => editor.change({ densityKgM3: typed?.densityKgM3 ?? null, densitySpreadKgM3: typed?.densitySpreadKgM3 ?? null, material: null })}
          />
        ) : (
          <span className="figure">{density ? writeSpreadDensity(density) : 'not stated'}</span>
        )}
        {inForce && <p className="density-in-force">{inForce}</p>}
      </Fact>
    </>
  );
}

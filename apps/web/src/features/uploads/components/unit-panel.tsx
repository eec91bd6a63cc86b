import { Button } from '@blueprintjs/core';
import type { Material, NamedMaterial } from '@masswright/contracts';
import type { LengthUnit } from '@masswright/units';
import { useEffect, useMemo, useRef, useState } from 'react';
import { DensityField } from '../../../components/density-field';
import { MaterialPicker } from '../../../components/material-picker';
import { readDensity } from '../../../lib/density';
import { countOf } from '../../../lib/plural';
import { unitTexts } from '../../../lib/unit-texts';
import { describeDeclaredUnits, findCommonUnit } from '../model/declared-units';
import { isRead } from '../model/quick-figures';
import { computeUnitEvidence, findMedianMesh } from '../model/unit-evidence';
import type { UploadEntry } from '../model/upload-entry';
import { stateUploads } from '../model/upload-queue';
import { UnitByFile } from './unit-by-file';
import { UnitPicture } from './unit-picture';
import { UnitQuestion } from './unit-question';

interface UnitPanelProps {
  /** Files of which nobody has said the unit. */
  entries: readonly UploadEntry[];
  materials: readonly Material[];
  /** Everything is answered, or is to be answered later. */
  onAnswered: () => void;
}

interface DensityAnswer {
  material: NamedMaterial | null;
  text: string;
}

/** Of what the meshes are made, as far as it is said: the named material's density, or the typed one. */
function readAnswer({ material, text }: DensityAnswer, materials: readonly Material[]): { densityKgM3: number | null; error?: string } {
  const named = material && materials.find(({ id }) => id === material.id);
  if (named) return { densityKgM3: named.densityKgM3 };
  const typed = readDensity(text);
  return typed.error === undefined ? { densityKgM3: typed.densityKgM3 } : { densityKgM3: null, error: typed.error };
}

/** The one question of a drop: in which unit the meshes are; with what each answer would mean before the person's eyes. */
export function UnitPanel({ entries, materials, onAnswered }: UnitPanelProps) {
  const [chosen, setUnit] = useState<LengthUnit>();
  // Nothing is chosen for the person but what all of the files say themselves.
  const unit = chosen ?? findCommonUnit(entries);
  const [density, setDensity] = useState<DensityAnswer>({ material: null, text: '' });
  const [byFile, setByFile] = useState<readonly string[]>();
  const [asked, setAsked] = useState(false);
  const panel = useRef<HTMLFormElement>(null);
  useEffect(() => {
    // The keys that are named below work at once, unless the person is typing elsewhere in the dialog.
    const focused = document.activeElement;
    if (!(focused instanceof HTMLInputElement)) panel.current?.querySelector<HTMLInputElement>('input[type=radio]')?.focus();
  }, []);
  const { densityKgM3, error } = readAnswer(density, materials);
  const keys = entries.map(({ key }) => key);
  const stated = { material: density.material, densityKgM3: density.material ? null : densityKgM3 };

  const answer = (): void => {
    if (unit === undefined || error !== undefined) return setAsked(true);
    stateUploads(keys, { lengthUnit: unit, ...stated });
    onAnswered();
  };
  const answerLater = (): void => {
    if (error !== undefined) return setAsked(true);
    if (stated.material || stated.densityKgM3 !== null) stateUploads(keys, stated);
    onAnswered();
  };
  const decideByFile = (): void => {
    if (error !== undefined) return setAsked(true);
    stateUploads(keys, stated);
    setByFile(keys);
  };
  return (
    <form
      ref={panel}
      noValidate
      className="unit-panel"
      onSubmit={(event) => {
        event.preventDefault();
        answer();
      }}
    >
      <h3>{entries.length === 1 ? 'What unit is this mesh in?' : `What unit are these ${entries.length} meshes in?`}</h3>
      <p className="soft">
        {describeDeclaredUnits(entries)} No mass is stated until you answer; the answer can be changed at any time.
      </p>
      <div className="unit-panel-material">
        <div className="unit-panel-field">
          <span className="unit-panel-label">Material</span>
          <MaterialPicker label="Material" materials={materials} value={density.material} onChange={(material) => setDensity({ material: material && { id: material.id, name: material.name }, text: '' })} />
        </div>
        <div className="unit-panel-field">
          <DensityField
            text={density.text}
            label="or density"
            ariaLabel="Density"
            emptyHint={density.material ? 'that of the material' : 'With its unit, or leave it empty for now'}
            onChange={(text) => setDensity({ material: text.trim() === '' ? density.material : null, text })}
          />
        </div>
      </div>
      {byFile ? <ByFile keys={byFile} entries={entries} densityKgM3={densityKgM3} /> : <Evidence entries={entries} unit={unit} onUnit={setUnit} densityKgM3={densityKgM3} />}
      <div className="unit-panel-foot">
        {byFile ? (
          <Button intent="primary" onClick={onAnswered}>
            Done
          </Button>
        ) : (
          <>
            <Button intent="primary" type="submit">
              {unit === undefined ? 'Choose the unit above' : `${entries.length === 1 ? 'It is in' : 'These are'} ${unitTexts[unit].plural}`}
            </Button>
            {entries.length > 1 && <Button onClick={decideByFile}>Decide file by file</Button>}
            <Button onClick={answerLater}>Later</Button>
          </>
        )}
        <span role="alert" className="add-meshes-missing">
          {asked && (error ?? (unit === undefined ? 'Say in which unit the meshes are, or answer later.' : ''))}
        </span>
        {!byFile && (
          <span className="soft unit-panel-keys screen-only">
            <kbd>↑</kbd> <kbd>↓</kbd> choose <kbd>Enter</kbd> answer
          </span>
        )}
      </div>
    </form>
  );
}

interface EvidenceProps {
  entries: readonly UploadEntry[];
  unit: LengthUnit | undefined;
  onUnit: (unit: LengthUnit) => void;
  densityKgM3: number | null;
}

function Evidence({ entries, unit, onUnit, densityKgM3 }: EvidenceProps) {
  const read = useMemo(() => entries.flatMap(({ quick, fileName, part }) => (isRead(quick) ? [{ ...quick, fileName, hasInside: part?.isDefensible !== false }] : [])), [entries]);
  const evidence = useMemo(() => computeUnitEvidence(read, densityKgM3), [read, densityKgM3]);
  const median = useMemo(() => findMedianMesh(read), [read]);
  const waiting = entries.filter(({ quick }) => quick === undefined).length;
  const unread = entries.filter(({ quick }) => quick === null).length;
  const hollow = read.filter(({ hasInside }) => !hasInside).length;
  // Nothing is chosen for the person; the picture shows a unit all the same, and says which.
  const pictured = unit ?? evidence.find(({ isPlausible }) => isPlausible)?.lengthUnit ?? 'mm';
  return (
    <>
      <div className="unit-table-frame" role="region" aria-label="What each unit would mean" tabIndex={0}>
        <UnitQuestion evidence={evidence} answer={unit} onAnswer={onUnit} count={entries.length} />
      </div>
      {median && <UnitPicture mesh={median} fileName={median.fileName} lengthUnit={pictured} />}
      <p className="soft unit-panel-read" role="status">
        {waiting > 0 ? `Read ${entries.length - waiting} of ${countOf(entries.length, 'file')} for this table` : read.length === 0 ? 'None of the files could be read here; the sizes show after they are measured.' : ''}
        {unread > 0 && read.length > 0 && ` ${countOf(unread, 'file')} too large to be read here.`}
        {hollow > 0 && densityKgM3 !== null && ` ${countOf(hollow, 'mesh', 'meshes')} without an inside left out of the masses.`}
      </p>
    </>
  );
}

/** The files stay in the table while their units are chosen one by one. */
function ByFile({ keys, entries, densityKgM3 }: { keys: readonly string[]; entries: readonly UploadEntry[]; densityKgM3: number | null }) {
  return <UnitByFile entries={entries.filter(({ key }) => keys.includes(key))} densityOf={() => densityKgM3} />;
}

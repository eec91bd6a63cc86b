import type { LengthUnit } from '@masswright/units';
import { useId } from 'react';
import { writeRoughLength, writeRoughMass } from '../../../lib/rough-figure';
import { unitTexts } from '../../../lib/unit-texts';
import type { UnitEvidence } from '../model/unit-evidence';

interface UnitQuestionProps {
  /** In the order in which they are shown; without figures while nothing is read. */
  evidence: readonly UnitEvidence[];
  answer: LengthUnit | undefined;
  onAnswer: (answer: LengthUnit) => void;
  count: number;
}

function Rough({ figure, unit }: { figure: string; unit: string }) {
  return (
    <td className="numeric figure">
      {figure}
      <span className="unit"> {unit}</span>
    </td>
  );
}

const nothing = { figure: '–', unit: '' };
const unitsBySize: readonly LengthUnit[] = ['micron', 'mm', 'cm', 'inch', 'foot', 'm'];

/** Most mesh files don't say their unit, and a wrong one is wrong by its cube: so it is asked, with what each answer would mean, and none is preselected but what the files say. */
export function UnitQuestion({ evidence, answer, onAnswer, count }: UnitQuestionProps) {
  const name = useId();
  const single = count === 1;
  const anyPlausible = evidence.some(({ isPlausible }) => isPlausible);
  return (
    <table className="table unit-table" role="radiogroup" aria-label="Unit of the meshes">
      <thead>
        <tr>
          <th scope="col">If {single ? 'the' : 'a'} unit is</th>
          {!single && (
            <th scope="col" className="numeric">
              Smallest
            </th>
          )}
          <th scope="col" className="numeric">
            {single ? 'Longest side' : 'Median size'}
          </th>
          {!single && (
            <th scope="col" className="numeric">
              Largest
            </th>
          )}
          <th scope="col" className="numeric">
            {single ? 'Mass' : 'Median mass'}
          </th>
          {!single && (
            <th scope="col" className="numeric">
              All together
            </th>
          )}
          <th scope="col">Reads as</th>
        </tr>
      </thead>
      <tbody>
        {unitsBySize.map((unit) => {
          const row = evidence.find(({ lengthUnit }) => lengthUnit === unit);
          const recedes = row !== undefined && anyPlausible && !row.isPlausible && answer !== unit;
          const mass = (massKg: number | null | undefined) => (massKg === null || massKg === undefined ? nothing : writeRoughMass(massKg));
          return (
            <tr key={unit} className={`unit-row${answer === unit ? ' unit-row-chosen' : ''}${recedes ? ' unit-row-recedes' : ''}`} onClick={() => onAnswer(unit)}>
              <th scope="row">
                <label>
                  <input type="radio" name={name} value={unit} checked={answer === unit} onChange={() => onAnswer(unit)} />
                  {unitTexts[unit].name}
                </label>
              </th>
              {!single && <Rough {...(row ? writeRoughLength(row.smallestM) : nothing)} />}
              <Rough {...(row ? writeRoughLength(row.medianM) : nothing)} />
              {!single && <Rough {...(row ? writeRoughLength(row.largestM) : nothing)} />}
              <Rough {...mass(row?.medianKg)} />
              {!single && <Rough {...mass(row?.totalKg)} />}
              <td>{row?.readsAs ?? '…'}</td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

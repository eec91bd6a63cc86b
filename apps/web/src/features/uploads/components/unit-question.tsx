import { lengthUnits, type LengthUnit } from '@masswright/units';
import { unitTexts } from '../../../lib/unit-texts';

/** 'later' is an answer that a person gives, not one that we assume. */
export type UnitAnswer = LengthUnit | 'later';

interface UnitQuestionProps {
  answer: UnitAnswer | undefined;
  onAnswer: (answer: UnitAnswer) => void;
  files: number;
}

/** Mesh files don't say their unit, and a wrong one is wrong by its cube: so it is asked, and none is preselected. */
export function UnitQuestion({ answer, onAnswer, files }: UnitQuestionProps) {
  return (
    <fieldset className="unit-question">
      <legend>
        <h3>{files === 1 ? 'What unit is this mesh in?' : 'What unit are these meshes in?'}</h3>
        <p className="soft">The files do not say. The answer can be changed later; no mass is stated until there is one.</p>
      </legend>
      <div className="unit-question-head" aria-hidden="true">
        <span className="caption">If the unit is</span>
        <span className="caption">100 in the file is</span>
        <span className="caption">Usual for</span>
      </div>
      {lengthUnits.map((unit) => (
        <label key={unit} className="unit-option">
          <input type="radio" name="unit" value={unit} checked={answer === unit} onChange={() => onAnswer(unit)} />
          <span className="unit-option-name">{unitTexts[unit].name}</span>
          <span className="figure">{unitTexts[unit].means}</span>
          <span className="soft">{unitTexts[unit].usual}</span>
        </label>
      ))}
      <label className="unit-option">
        <input type="radio" name="unit" value="later" checked={answer === 'later'} onChange={() => onAnswer('later')} />
        <span className="unit-option-name">not known yet</span>
        <span className="soft unit-option-wide">measured all the same; size and mass follow once you state it</span>
      </label>
    </fieldset>
  );
}

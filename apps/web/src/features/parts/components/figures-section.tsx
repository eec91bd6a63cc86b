import type { Soundness, StatementRecord } from '@masswright/contracts';
import { fromSi, type Quantity } from '@masswright/units';
import { Figure } from '../../../components/figure';
import { Notice } from '../../../components/notice';
import { chooseDisplayUnit } from '../model/display-units';
import { findRefusal } from '../model/soundness-words';
import { Balance } from './balance';
import { findPrincipal, PrincipalTable } from './principal-table';
import { Section, sectionNames } from './section';
import { TensorView } from './tensor-view';

function HeadFigure({ name, quantity, value }: { name: string; quantity: Quantity; value: number }) {
  const unit = chooseDisplayUnit(quantity, value);
  return (
    <div className="head-figure">
      <dt className="caption">{name}</dt>
      <dd>
        <Figure value={fromSi(value, unit)} unit={unit.symbol} big />
      </dd>
    </div>
  );
}

/** Why there are no figures: the mesh has no inside, or something is not stated yet. */
function NoFigures({ soundness, statement, canEdit }: { soundness: Soundness; statement: StatementRecord | undefined; canEdit: boolean }) {
  const refusal = findRefusal(soundness);
  if (refusal) {
    return (
      <Notice tone="wrong">
        <p>
          <b>No figures.</b> {refusal.why}
        </p>
        <p>{refusal.remedy}</p>
      </Notice>
    );
  }
  const missing = statement === undefined ? 'unit' : 'density';
  return (
    <Notice tone="doubt">
      <p>
        <b>{statement === undefined ? 'No figures yet.' : 'No mass yet.'}</b>{' '}
        {missing === 'unit'
          ? 'The file does not say its unit, and none is assumed: a wrong one would be wrong by its cube.'
          : 'Mass and inertia need the density of the part.'}{' '}
        {canEdit ? <a href={`#${sectionNames.source.id}`}>State the {missing} in section 1.</a> : `The ${missing} is not stated.`}
      </p>
    </Notice>
  );
}

interface FiguresSectionProps {
  soundness: Soundness;
  statement: StatementRecord | undefined;
  canEdit: boolean;
}

export function FiguresSection({ soundness, statement, canEdit }: FiguresSectionProps) {
  const principal = statement && findPrincipal(statement);
  const complete = statement?.massKg !== null && statement !== undefined;
  return (
    <Section name={sectionNames.figures} aside={complete && 'of a uniform body, about its centre of mass, axes of the mesh frame'}>
      {!complete && <NoFigures soundness={soundness} statement={statement} canEdit={canEdit} />}
      {statement && soundness.defensible && (
        <dl className="head-figures">
          {statement.massKg !== null && <HeadFigure name="Mass" quantity="mass" value={statement.massKg} />}
          {statement.volumeM3 !== null && <HeadFigure name="Volume" quantity="volume" value={statement.volumeM3} />}
          <HeadFigure name="Surface" quantity="area" value={statement.areaM2} />
        </dl>
      )}
      {statement?.centreOfMassM && <Balance box={statement.boundingBoxM} centreM={statement.centreOfMassM} />}
      {statement?.inertiaAtCentreOfMassKgM2 && principal && (
        <div className="turning">
          <TensorView tensor={statement.inertiaAtCentreOfMassKgM2} />
          <PrincipalTable principal={principal} />
        </div>
      )}
    </Section>
  );
}

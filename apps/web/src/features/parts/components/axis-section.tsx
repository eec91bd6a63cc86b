import type { Axis, StatementRecord } from '@masswright/contracts';
import { computeAxisMoment, resolveAxis } from '@masswright/mechanics';
import { fromSi, type Quantity } from '@masswright/units';
import { useState } from 'react';
import { ChoiceBar } from '../../../components/choice-bar';
import { Figure } from '../../../components/figure';
import { Notice } from '../../../components/notice';
import { Uncertain } from '../../../components/uncertain';
import { axisChoices, computeAxis, describeAxis, findChoice } from '../model/axis-choice';
import { describeAxes, isAxisUnique } from '../model/axes-words';
import { chooseDisplayUnit } from '../model/display-units';
import { isSameAxis } from '../model/setting-difference';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { DriveFields } from './drive-fields';
import { Fact, Section, sectionNames } from './section';
import { TypedAxisFields } from './typed-axis';

interface ShownProps {
  quantity: Quantity;
  value: number;
  /** Expanded, k = 2; left out where none is told. */
  uncertainty?: number;
}

function Shown({ quantity, value, uncertainty }: ShownProps) {
  const unit = chooseDisplayUnit(quantity, value);
  if (uncertainty !== undefined) return <Uncertain value={fromSi(value, unit)} uncertainty={fromSi(uncertainty, unit)} unit={unit.symbol} />;
  return <Figure value={fromSi(value, unit)} unit={unit.symbol} />;
}

/** Beyond rounding, an axis through the centre of mass has no arm. */
const armThatCounts = 1e-9;

function AxisFigures({ statement, state }: { statement: StatementRecord; state: SettingEditorState }) {
  const { massKg, centreOfMassM, inertiaAtCentreOfMassKgM2, principalAxes } = statement;
  const { axis } = state.draft;
  const line = resolveAxis(axis, { centreOfMassM, principalAxes });
  if (massKg === null || !centreOfMassM || !inertiaAtCentreOfMassKgM2 || !line) return null;
  const doubt = statement.uncertainty?.aboutAxis ?? undefined;
  const moment = computeAxisMoment({ massKg, centreOfMassM, inertiaAtCentreOfMassKgM2 }, line);
  const apart = moment.distanceM > armThatCounts * Math.max(moment.radiusOfGyrationM, moment.distanceM);
  return (
    <dl className="facts">
      <Fact name="Moment">
        <b className="axis-moment">
          <Shown quantity="inertia" value={moment.inertiaKgM2} uncertainty={doubt?.inertiaKgM2} />
        </b>{' '}
        <span className="soft">{describeAxis(axis, line)}</span>
      </Fact>
      {axis.kind === 'typed' && (
        <>
          <Fact name="of which">
            <Shown quantity="inertia" value={moment.throughCentreKgM2} /> <span className="soft">about the parallel axis through the centre of mass</span>
          </Fact>
          <Fact name="and">
            <Shown quantity="inertia" value={apart ? moment.parallelAxisTermKgM2 : 0} />{' '}
            <span className="soft">
              by the parallel-axis theorem, m d²: the axis passes the centre of mass at <Shown quantity="length" value={apart ? moment.distanceM : 0} />
            </span>
          </Fact>
        </>
      )}
      {axis.kind !== 'typed' && (
        <Fact name="Parallel axis">
          <span className="soft">nothing to add: this axis goes through the centre of mass</span>
        </Fact>
      )}
      <Fact name="Gyration">
        <Shown quantity="length" value={moment.radiusOfGyrationM} uncertainty={doubt?.radiusOfGyrationM} /> <span className="soft">radius of gyration about this axis</span>
      </Fact>
    </dl>
  );
}

interface AxisSectionProps {
  statement: StatementRecord;
  canEdit: boolean;
  editor: SettingEditor;
  state: SettingEditorState;
}

export function AxisSection({ statement, canEdit, editor, state }: AxisSectionProps) {
  const { axis, drive } = state.draft;
  const { axes, aboutAxis } = statement;
  /** The axis that was set when its fields stopped to be one. A change from elsewhere writes them anew. */
  const [unreadable, setUnreadable] = useState<Axis>();
  const isUnreadable = unreadable !== undefined && isSameAxis(unreadable, axis);
  const setAxis = (next: Axis): void => {
    setUnreadable(undefined);
    editor.change({ axis: next });
  };
  const ambiguous = axis.kind === 'principal' && axes && !isAxisUnique(axes, axis.number);
  return (
    <Section name={sectionNames.axis}>
      {canEdit && (
        <div className="screen-only axis-choice">
          <ChoiceBar
            label="Axis"
            choices={axisChoices}
            value={findChoice(axis)}
            onChange={(choice) => setAxis(computeAxis(choice, axis, statement))}
          />
          {axis.kind === 'typed' && <TypedAxisFields axis={axis} onChange={setAxis} onUnreadable={() => setUnreadable(axis)} />}
        </div>
      )}
      {isUnreadable ? <p>Mend the axis first: a moment is about an axis.</p> : <AxisFigures statement={statement} state={state} />}
      {ambiguous && <p className="soft">{describeAxes(axes)}</p>}
      {aboutAxis && (canEdit || drive) && (
        <div className={drive ? 'drive' : 'drive screen-only'}>
          <h3>Drive</h3>
          <DriveFields drive={drive} inertiaKgM2={isUnreadable ? undefined : aboutAxis.inertiaKgM2} canEdit={canEdit} onChange={(typed) => editor.change({ drive: typed })} />
          <Notice tone="doubt">
            <p>
              What turns stores energy, and gives it back at once when it meets a hand. These figures size a drive; they do not make it safe. Assess the risk
              (ISO 12100), guard what turns (ISO 14120) and interlock the guard (ISO 14119) before it runs. Local codes and the judgement of licensed engineers
              decide.
            </p>
          </Notice>
        </div>
      )}
    </Section>
  );
}

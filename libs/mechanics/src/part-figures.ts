import type { Measurement, MeasuringRun, PartRow, PartState, Setting, StoredSetting, UnitDoubt } from '@masswright/contracts';
import { computeFigures, type MeasuredFigures } from './compute-figures';
import { findUnitDoubt } from './unit-doubt';

/** What a row of a list says of a part in figures; all null while the unit is not stated or the file not measured. */
export type PartFigures = Pick<PartRow, 'sizeM' | 'volumeM3' | 'massKg' | 'balance' | 'principalMomentsKgM2'>;

/** All that a part's row follows from: its latest revision, and the one before. */
export interface PartSource {
  run: Pick<MeasuringRun, 'state'>;
  setting: Setting & Pick<StoredSetting, 'unitStated'>;
  measurement: Measurement | null;
  /** Of the last earlier revision that was measured; null where there is none. */
  before: { measurement: Measurement; lengthUnit: Setting['lengthUnit'] } | null;
}

/** What a list says of a part. */
export interface PartSummary {
  state: PartState;
  figures: PartFigures;
  unitDoubt: UnitDoubt | null;
}

const noFigures: PartFigures = { sizeM: null, volumeM3: null, massKg: null, balance: null, principalMomentsKgM2: null };

/** Summarises a part for a list: its state, its figures, and whether its unit is in doubt. The same function for browser, server and worker. */
export function summarisePart({ run, setting, measurement, before }: PartSource): PartSummary {
  const figures = measurement === null || setting.lengthUnit === null ? undefined : computeFigures(measurement, setting, setting.lengthUnit);
  const unitDoubt = computeUnitDoubt(setting, measurement, before);
  return {
    state: chooseState(run, setting, measurement, figures, unitDoubt),
    figures: figures === undefined ? noFigures : presentFigures(figures),
    unitDoubt,
  };
}

/** Asked only while nobody has stated the unit for this very file. */
function computeUnitDoubt(setting: PartSource['setting'], measurement: Measurement | null, before: PartSource['before']): UnitDoubt | null {
  const now = measurement?.volume;
  const then = before?.measurement.volume;
  if (!now || !then || setting.lengthUnit === null || setting.unitStated !== null || !before?.lengthUnit) return null;
  return findUnitDoubt({ volume: now.content, lengthUnit: setting.lengthUnit }, { volume: then.content, lengthUnit: before.lengthUnit }) ?? null;
}

function chooseState(run: PartSource['run'], setting: Setting, measurement: Measurement | null, figures: MeasuredFigures | undefined, unitDoubt: UnitDoubt | null): PartState {
  if (run.state === 'failed') return 'failed';
  if (run.state !== 'done' || measurement === null) return 'measuring';
  if (!measurement.soundness.defensible) return 'not-defensible';
  if (setting.lengthUnit === null || figures === undefined) return 'unit-missing';
  if (unitDoubt !== null) return 'unit-doubt';
  if (figures.body === null) return 'density-missing';
  return figures.weighing?.verdict === 'disagrees' ? 'weight-disagrees' : 'ready';
}

function presentFigures({ boundingBoxM: { min, max }, centreOfMassM: centre, volumeM3, body, principal }: MeasuredFigures): PartFigures {
  const share = (k: 0 | 1 | 2): number => {
    const span = max[k] - min[k];
    return centre === null || !(span > 0) ? 0.5 : (centre[k] - min[k]) / span;
  };
  return {
    sizeM: [max[0] - min[0], max[1] - min[1], max[2] - min[2]],
    volumeM3,
    massKg: body?.massKg ?? null,
    balance: centre === null ? null : [share(0), share(1), share(2)],
    principalMomentsKgM2: principal?.moments ?? null,
  };
}

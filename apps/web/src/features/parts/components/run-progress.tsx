import type { MeasuringRun } from '@masswright/contracts';
import type { ReactNode } from 'react';
import { Notice } from '../../../components/notice';
import { describePlace, describeRun } from '../model/run-words';

const stages = [
  { stage: 'waiting', name: 'Waiting' },
  { stage: 'hashing', name: 'Comparing' },
  { stage: 'reading', name: 'Reading' },
  { stage: 'measuring', name: 'Measuring' },
  { stage: 'examining', name: 'Examining' },
  { stage: 'storing', name: 'Storing' },
] as const satisfies readonly { stage: MeasuringRun['stage']; name: string }[];

/** What takes the place of the figures until there are some: how far the file is, or why it stopped. */
export function RunProgress({ run, actions }: { run: MeasuringRun; actions?: ReactNode }) {
  if (run.state === 'failed') {
    const place = run.error && describePlace(run.error.at);
    return (
      <Notice tone="wrong" live>
        <p>
          <b>This file could not be measured.</b> {run.error?.message ?? 'The reason is not known.'}
        </p>
        {place && (
          <p>
            It stopped at <span className="figure">{place}</span>.
          </p>
        )}
        <p className="soft">
          Where the fault is in the file, mend it or export it again and replace it: the part keeps its number and its name. Where it was not, have it measured
          again.
        </p>
        {actions && <div className="notice-actions screen-only">{actions}</div>}
      </Notice>
    );
  }
  const current = stages.findIndex(({ stage }) => stage === run.stage);
  return (
    <div className="run-progress" role="status">
      <ol>
        {stages.map(({ stage, name }, index) => (
          <li key={stage} className={index < current ? 'stage-done' : index === current ? 'stage-now' : undefined} aria-current={index === current ? 'step' : undefined}>
            {name}
          </li>
        ))}
      </ol>
      <progress className="part-run-progress" max={1} value={run.progress} aria-label={describeRun(run)} />
      <p className="soft">The figures appear here by themselves. You can state unit and density meanwhile, or leave the page.</p>
    </div>
  );
}

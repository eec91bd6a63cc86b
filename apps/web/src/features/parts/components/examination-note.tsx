import type { Measurement, MeasuringRun } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { useState } from 'react';
import { Notice } from '../../../components/notice';
import { describeRun } from '../model/run-words';

/** Meshes of more facets are too large to be examined beyond their edges. */
const examinedFacets = 4_000_000;

function Progress({ run, children }: { run: MeasuringRun; children: string }) {
  return (
    <div className="examination" role="status">
      <p>{children}</p>
      <progress className="part-run-progress" max={1} value={run.progress} aria-label={describeRun(run)} />
    </div>
  );
}

/** Which of the figures stand already while a file is examined or measured again, and what was not examined at all. */
export function ExaminationNote({ measurement, run }: { measurement: Measurement; run: MeasuringRun }) {
  const { examined, facets } = measurement;
  const [wasSeen, setWasSeen] = useState(false);
  if (examined === 'integrals' && !wasSeen) setWasSeen(true);
  const isRunning = run.state === 'queued' || run.state === 'running';
  if (isRunning && examined !== 'integrals') return <Progress run={run}>{`The file is measured again: ${describeRun(run).toLowerCase()}. What stands here is from before, until it is done.`}</Progress>;
  if (run.state === 'failed') {
    return (
      <Notice tone="wrong">
        <p>
          <b>The file could not be measured again.</b> {run.error?.message ?? 'The reason is not known.'} What stands here is from before.
        </p>
      </Notice>
    );
  }
  if (examined === 'integrals') {
    return (
      <Progress run={run}>
        Volume, mass and closedness stand. Shells, openings, facets that pass through each other and what the facets make of curved surfaces are being examined; they appear here by themselves.
      </Progress>
    );
  }
  if (examined === 'whole') {
    // It keeps its room for as long as the page is open: nothing that is being read is to move.
    return wasSeen ? (
      <div className="examination screen-only" role="status">
        <p>Everything is examined: all that stands here is final.</p>
      </div>
    ) : null;
  }
  return (
    <Notice tone="doubt">
      <p>
        <b>Examined in part.</b> Volume, mass and closedness stand. Shells, cavities, openings, facets that pass through each other and the doubt of the facets were not examined:{' '}
        {facets > examinedFacets ? `the mesh has ${formatCount(facets)} facets, and meshes of up to ${formatCount(examinedFacets)} are.` : 'it took longer than a file of its size may take.'} Export the mesh with fewer facets where you need them.
      </p>
    </Notice>
  );
}

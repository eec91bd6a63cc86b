import { Button } from '@blueprintjs/core';
import { measuringVersion, type Measurement, type Part, type Setting } from '@masswright/contracts';
import { useMemo } from 'react';
import { PowerText } from '../../../components/figure';
import { Notice } from '../../../components/notice';
import { ProblemNotice } from '../../../components/problem-notice';
import { useMeasureAgain } from '../api/parts';
import { isOutdated, listVersionDifferences } from '../model/version-differences';
import { Fact } from './section';

/** A file that an earlier version measured, and how to have it measured by the present one. */
function OutdatedNote({ part, measurement }: { part: Part; measurement: Measurement }) {
  const again = useMeasureAgain();
  if (part.revision.run.state !== 'done') return null;
  return (
    <Notice tone="doubt">
      <p>
        <b>Measured by an earlier version.</b> These figures are version {measurement.measuringVersion}’s. The present one, {measuringVersion}, also finds shells, openings, crossings and the doubt of the
        facets, and says what it finds otherwise.
      </p>
      {part.can.edit && (
        <div className="notice-actions screen-only">
          <Button size="small" loading={again.isPending} onClick={() => again.mutate(part.id)}>
            Measure again
          </Button>
        </div>
      )}
      {again.error && <ProblemNotice error={again.error} />}
    </Notice>
  );
}

function Differences({ before, after, setting }: { before: Measurement; after: Measurement; setting: Setting }) {
  const differences = useMemo(() => listVersionDifferences(before, after, setting), [before, after, setting]);
  const words = `An earlier statement of this revision was made by version ${before.measuringVersion}; this one is version ${after.measuringVersion}’s.`;
  if (differences === undefined) return <p className="fact-words">{words} What they found otherwise is told once the unit is stated.</p>;
  return (
    <>
      <p className="fact-words">{words} What it finds otherwise, under the present setting; shares are of the earlier figure, of places of the box’s diagonal.</p>
      <div className="small-table-frame" role="group" aria-label="Differences of the versions" tabIndex={0}>
        <table className="small-table">
          <thead>
            <tr>
              <th scope="col">Figure</th>
              <th scope="col" className="numeric">
                By {before.measuringVersion}
              </th>
              <th scope="col" className="numeric">
                Difference
              </th>
              <th scope="col" className="numeric">
                Share
              </th>
            </tr>
          </thead>
          <tbody>
            {differences.map(({ name, symbol, before: was, difference, share }) => (
              <tr key={name}>
                <th scope="row">
                  {name} <span className="unit">{symbol}</span>
                </th>
                <td className="figure numeric">
                  <PowerText text={was} />
                </td>
                <td className="figure numeric">
                  <PowerText text={difference} />
                </td>
                <td className="figure numeric">
                  <PowerText text={share} />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}

/** By which measuring version the figures are, where that is not the present one or another was there before. */
export function VersionFacts({ part, setting }: { part: Part; setting: Setting }) {
  const { measurement, measuredBefore } = part.revision;
  if (!measurement) return null;
  if (isOutdated(measurement)) {
    return (
      <Fact name="Version">
        <OutdatedNote part={part} measurement={measurement} />
      </Fact>
    );
  }
  if (!measuredBefore || measurement.examined === 'integrals') return null;
  return (
    <Fact name="Versions">
      <Differences before={measuredBefore} after={measurement} setting={setting} />
    </Fact>
  );
}

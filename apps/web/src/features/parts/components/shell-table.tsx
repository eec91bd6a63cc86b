import { Button } from '@blueprintjs/core';
import type { Measurement, Setting, Shell } from '@masswright/contracts';
import { formatCount, type LengthUnit } from '@masswright/units';
import { useState } from 'react';
import { PowerText } from '../../../components/figure';
import { AlignedText, computeTailRoom } from '../../../components/uncertain';
import { writeMeshContents } from '../model/mesh-words';
import { findShellRefusal } from '../model/shell-densities';
import { describeShellRules, shellKinds } from '../model/shell-words';
import type { SettingEditor } from '../model/setting-editor';
import { ShellDensityCell } from './shell-density-cell';

const shownFirst = 12;

interface Contents {
  texts: readonly string[];
  symbol: string;
  behind: number;
}

function computeContents(contents: readonly number[], power: 2 | 3, unit: LengthUnit | null): Contents {
  const written = writeMeshContents(contents, power, unit);
  return { ...written, behind: computeTailRoom(written.texts) };
}

const AlignedContent = ({ text, behind }: { text: string; behind: number }) => (text.includes('×') ? <PowerText text={text} /> : <AlignedText text={text} behind={behind} />);

interface ShellTableProps {
  measurement: Measurement & { shells: Shell[] };
  setting: Setting;
  /** Undefined where the reader may change nothing. */
  editor: SettingEditor | undefined;
}

/** The pieces of a mesh, and with which density each counts. */
export function ShellTable({ measurement, setting, editor }: ShellTableProps) {
  const [isWhole, setIsWhole] = useState(false);
  const { shells } = measurement;
  const { lengthUnit } = setting;
  const refusal = findShellRefusal(measurement);
  // Whichever of them counts: what the mesh encloses can't be told.
  const canDiffer = refusal === undefined && measurement.soundness.defensible;
  const shown = isWhole ? shells : shells.slice(0, shownFirst);
  const volumes = computeContents(shells.map(({ volume }) => volume?.content ?? 0), 3, lengthUnit);
  const areas = computeContents(shells.map(({ area }) => area), 2, lengthUnit);
  return (
    <div className="shells">
      <div className="small-table-frame" role="group" aria-label="Shells" tabIndex={0}>
        <table className="small-table">
          <thead>
            <tr>
              <th scope="col" className="numeric">
                No.
              </th>
              <th scope="col">Kind</th>
              <th scope="col" className="numeric">
                Inside
              </th>
              <th scope="col" className="numeric">
                Facets
              </th>
              <th scope="col" className="numeric">
                Volume <span className="unit">{volumes.symbol}</span>
              </th>
              <th scope="col" className="numeric">
                Surface <span className="unit">{areas.symbol}</span>
              </th>
              {canDiffer && <th scope="col">Density</th>}
            </tr>
          </thead>
          <tbody>
            {shown.map((shell, index) => (
              <tr key={index}>
                <td className="figure numeric">{index + 1}</td>
                <td>
                  {shellKinds[shell.kind]}
                  {shell.turned && <span className="soft">, turned</span>}
                </td>
                <td className="figure numeric">{shell.inside === null ? '–' : shell.inside + 1}</td>
                <td className="figure numeric">{formatCount(shell.facets)}</td>
                <td className="figure numeric">{shell.volume === null ? '–' : <AlignedContent text={volumes.texts[index] ?? ''} behind={volumes.behind} />}</td>
                <td className="figure numeric">
                  <AlignedContent text={areas.texts[index] ?? ''} behind={areas.behind} />
                </td>
                {canDiffer && (
                  <td>
                    <ShellDensityCell shell={index} kind={shell.kind} setting={setting} editor={editor} />
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {shells.length > shownFirst && (
        <Button size="small" className="screen-only" onClick={() => setIsWhole(!isWhole)}>
          {isWhole ? `Show the first ${shownFirst}` : `Show all ${shells.length}`}
        </Button>
      )}
      <p className="soft fact-words">
        {refusal ?? describeShellRules(shells)}
      </p>
    </div>
  );
}

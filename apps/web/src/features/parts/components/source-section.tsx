import { HTMLSelect } from '@blueprintjs/core';
import { lengthUnit as lengthUnitSchema, type Part } from '@masswright/contracts';
import { formatCount, lengthUnits } from '@masswright/units';
import { CopyButton } from '../../../components/copy-button';
import { formatBytes } from '../../../lib/format-bytes';
import { formatDuration, formatMoment } from '../../../lib/format-time';
import { writeDensity } from '../../../lib/density';
import { unitTexts } from '../../../lib/unit-texts';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { DensitySetting } from './density-setting';
import { Fact, Section, sectionNames } from './section';

const formatNames = { 'stl-binary': 'binary STL', 'stl-ascii': 'text STL' } as const;

function UnitSetting({ editor, state }: { editor: SettingEditor; state: SettingEditorState }) {
  return (
    <HTMLSelect
      aria-label="Unit"
      value={state.draft.lengthUnit ?? ''}
      options={[{ value: '', label: 'not stated' }, ...lengthUnits.map((value) => ({ value, label: unitTexts[value].name }))]}
      onChange={(event) => editor.change({ lengthUnit: lengthUnitSchema.nullable().parse(event.currentTarget.value || null) })}
    />
  );
}

interface SourceSectionProps {
  part: Part;
  editor: SettingEditor;
  state: SettingEditorState;
}

export function SourceSection({ part, editor, state }: SourceSectionProps) {
  const { revision } = part;
  const { run, sha256, measurement, format } = revision;
  const measured = run.finishedAt && run.state === 'done';
  return (
    <Section
      name={sectionNames.source}
      aside={
        measured && (
          <>
            measured {formatMoment(run.finishedAt ?? '')}
            {run.durationMs !== null && ` in ${formatDuration(run.durationMs)}`}
          </>
        )
      }
    >
      <dl className="facts">
        <Fact name="File">
          <span className="figure file-name-whole">{revision.fileName}</span>{' '}
          <span className="soft">
            {formatBytes(revision.sizeBytes)}, added {formatMoment(revision.createdAt)} by {revision.createdBy}
          </span>
        </Fact>
        {sha256 && (
          <Fact name="SHA-256">
            <span className="figure hash">{sha256}</span> <CopyButton text={sha256} what="the SHA-256" />
          </Fact>
        )}
        {format && measurement && (
          <Fact name="Mesh">
            {formatNames[format]}, <span className="figure">{formatCount(measurement.facets)}</span> facets, measuring version{' '}
            <span className="figure">{measurement.measuringVersion}</span>
          </Fact>
        )}
        {run.state !== 'failed' && <SettingFacts part={part} editor={editor} state={state} />}
      </dl>
    </Section>
  );
}

/** What a person states about the file: unit and density, and who did. */
function SettingFacts({ part, editor, state }: SourceSectionProps) {
  const { can } = part;
  const { draft, saved } = state;
  return (
    <>
      <Fact name="Unit">
        {can.edit ? <UnitSetting editor={editor} state={state} /> : draft.lengthUnit ? unitTexts[draft.lengthUnit].name : 'not stated'}
      </Fact>
      <Fact name="Density">
        {can.edit ? (
          <DensitySetting densityKgM3={draft.densityKgM3} onChange={(densityKgM3) => editor.change({ densityKgM3 })} />
        ) : (
          <span className="figure">{writeDensity(draft.densityKgM3) || 'not stated'}</span>
        )}
      </Fact>
      <Fact name="Setting">
        <span className="soft">
          version {saved.version}, last changed {formatMoment(saved.changedAt)} by {saved.changedBy}
        </span>
      </Fact>
    </>
  );
}

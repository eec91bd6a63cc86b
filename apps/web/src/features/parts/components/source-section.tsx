import type { Material, MeshFormat, Part, StatementRecord } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { Link } from 'react-router-dom';
import { CopyButton } from '../../../components/copy-button';
import { formatBytes } from '../../../lib/format-bytes';
import { formatDay, formatDuration, formatMoment } from '../../../lib/format-time';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { DensityFacts } from './density-facts';
import { MadeFacts } from './made-facts';
import { Fact, Section, sectionNames } from './section';
import { UnitFact } from './unit-fact';
import { VersionFacts } from './version-facts';

const formatNames: Readonly<Record<MeshFormat, string>> = {
  'stl-binary': 'binary STL',
  'stl-ascii': 'text STL',
  obj: 'OBJ',
  'ply-ascii': 'text PLY',
  'ply-binary': 'binary PLY',
  off: 'OFF',
  '3mf': '3MF',
  gltf: 'glTF',
  glb: 'binary glTF',
};

interface SourceSectionProps {
  part: Part;
  editor: SettingEditor;
  state: SettingEditorState;
  materials: readonly Material[];
  statement: StatementRecord | undefined;
}

export function SourceSection({ part, editor, state, materials, statement }: SourceSectionProps) {
  const { run, measurement } = part.revision;
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
        <FileFacts part={part} />
        <VersionFacts part={part} setting={state.draft} />
        <UnitFact part={part} editor={editor} state={state} />
        <DensityFacts editor={editor} state={state} canEdit={part.can.edit} materials={materials} statement={statement} declared={measurement?.declaredMaterials ?? []} />
        <MadeFacts editor={editor} state={state} canEdit={part.can.edit} statement={statement} />
        <Fact name="Setting">
          <span className="soft">
            version {state.saved.version}, last changed {formatMoment(state.saved.changedAt)} by {state.saved.changedBy}
          </span>
        </Fact>
        {part.revisions.length > 1 && <Revisions part={part} />}
      </dl>
    </Section>
  );
}

/** What the file is, and where else it is. */
function FileFacts({ part }: { part: Part }) {
  const { revision } = part;
  const { sha256, measurement, format, folder } = revision;
  return (
    <>
      <Fact name="File">
        <span className="figure file-name-whole">
          {folder && <span className="soft">{folder}/</span>}
          {revision.fileName}
        </span>{' '}
        <span className="soft">
          {formatBytes(revision.sizeBytes)}, added {formatMoment(revision.createdAt)} by {revision.createdBy}
        </span>
      </Fact>
      {sha256 && (
        <Fact name="SHA-256">
          <span className="figure hash">{sha256}</span> <CopyButton text={sha256} what="the SHA-256" />
        </Fact>
      )}
      {part.sameBytes.length > 0 && (
        <Fact name="Same bytes">
          <ul className="same-bytes">
            {part.sameBytes.map((other) => (
              <li key={`${other.partId} ${other.letter}`}>
                <Link to={`/projects/${other.projectId}/parts/${other.partId}`}>{other.name}</Link>{' '}
                <span className="soft">
                  revision <span className="figure">{other.letter}</span>
                  {other.projectId !== part.projectId && `, in ${other.projectName}`}
                </span>
              </li>
            ))}
          </ul>
          <span className="soft">They were measured once, and their measurements are one.</span>
        </Fact>
      )}
      {format && measurement && (
        <Fact name="Mesh">
          {formatNames[format]}
          {revision.compression && `, packed with ${revision.compression}`}, <span className="figure">{formatCount(measurement.facets)}</span> facets, measuring version{' '}
          <span className="figure">{measurement.measuringVersion}</span>
        </Fact>
      )}
    </>
  );
}

/** What became of the part, the latest first. */
function Revisions({ part }: { part: Part }) {
  return (
    <Fact name="Revisions">
      <ol className="revision-list">
        {part.revisions.map(({ id, letter, fileName, reason, createdAt, createdBy }) => (
          <li key={id} aria-current={id === part.revision.id ? 'true' : undefined}>
            <b className="figure">{letter}</b>
            <span>
              {reason || (id === part.revisions.at(-1)?.id ? 'The first.' : 'No reason given.')}{' '}
              <span className="soft">
                {fileName}, {formatDay(createdAt)}, {createdBy}
              </span>
            </span>
          </li>
        ))}
      </ol>
    </Fact>
  );
}

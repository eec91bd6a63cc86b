import type { Measurement, MeasuringRun, Setting, Shell } from '@masswright/contracts';
import { StatusTag } from '../../../components/status-tag';
import type { SettingEditor } from '../model/setting-editor';
import { describeShells } from '../model/shell-words';
import { describeEdges, describeIntersections, describeVertices, describeVerdict, describeWinding, pickVerdict } from '../model/soundness-words';
import { ExaminationNote } from './examination-note';
import { FindingList } from './finding-list';
import { OpeningsFact } from './openings-fact';
import { Fact, Section, sectionNames } from './section';
import { ShellTable } from './shell-table';

interface SoundnessSectionProps {
  measurement: Measurement;
  run: MeasuringRun;
  setting: Setting;
  /** Undefined where the reader may change nothing. */
  editor: SettingEditor | undefined;
}

const hasShells = (measurement: Measurement): measurement is Measurement & { shells: Shell[] } => measurement.shells !== null && measurement.shells.length > 1;

export function SoundnessSection({ measurement, run, setting, editor }: SoundnessSectionProps) {
  const { soundness, openings, examined, boundingBox } = measurement;
  const { lengthUnit } = setting;
  const verdict = describeVerdict(pickVerdict(measurement));
  const nothing = examined === 'whole' ? 'None.' : examined === 'integrals' ? 'None so far.' : 'None, as far as it was examined.';
  return (
    <Section name={sectionNames.soundness} aside={<StatusTag tone={verdict.tone}>{verdict.words}</StatusTag>}>
      <ExaminationNote measurement={measurement} run={run} />
      <dl className="facts">
        <Fact name="Edges">{describeEdges(soundness)}</Fact>
        <Fact name="Winding">{describeWinding(soundness)}</Fact>
        <Fact name="Vertices">{describeVertices(soundness, examined)}</Fact>
        {openings && <OpeningsFact openings={openings} box={boundingBox} unit={lengthUnit} />}
        <Fact name="Shells">
          {describeShells(measurement)}
          {hasShells(measurement) && <ShellTable measurement={measurement} setting={setting} editor={editor} />}
        </Fact>
        <Fact name="Crossings">{describeIntersections(soundness, measurement)}</Fact>
        <Fact name="Findings">{soundness.findings.length === 0 ? nothing : <FindingList findings={soundness.findings} box={boundingBox} unit={lengthUnit} />}</Fact>
      </dl>
    </Section>
  );
}

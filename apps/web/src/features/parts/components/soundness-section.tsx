import type { Soundness } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { StatusTag } from '../../../components/status-tag';
import { describeEdges, describeFinding, describeVerdict } from '../model/soundness-words';
import { Fact, Section, sectionNames } from './section';

export function SoundnessSection({ soundness }: { soundness: Soundness }) {
  const verdict = describeVerdict(soundness);
  return (
    <Section name={sectionNames.soundness} aside={<StatusTag tone={verdict.tone}>{verdict.words}</StatusTag>}>
      <dl className="facts">
        <Fact name="Edges">{describeEdges(soundness)}</Fact>
        <Fact name="Winding">
          {!soundness.closed
            ? 'Not judged: the mesh is open.'
            : soundness.oriented
              ? soundness.turned
                ? 'All one way, inwards: read the other way round.'
                : 'All one way, outwards.'
              : 'Facets are wound both ways.'}
        </Fact>
        <Fact name="Findings">
          {soundness.findings.length === 0 ? (
            'None.'
          ) : (
            <ul className="findings">
              {soundness.findings.map((finding) => (
                <li key={finding.kind}>
                  {describeFinding(finding)}
                  {finding.facets.length > 0 && (
                    <span className="soft">
                      {' '}
                      Facet{finding.facets.length > 1 && 's'} <span className="figure">{finding.facets.slice(0, 6).map((facet) => formatCount(facet + 1)).join(', ')}</span>
                      {finding.facets.length > 6 && ' …'}, counted from 1.
                    </span>
                  )}
                </li>
              ))}
            </ul>
          )}
        </Fact>
      </dl>
    </Section>
  );
}

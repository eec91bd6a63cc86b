import type { Measurement, StatementRecord } from '@masswright/contracts';
import type { SettingEditor } from '../model/setting-editor';
import { Balance } from './balance';
import { HeadFigures } from './head-figures';
import { NoFigures } from './no-figures';
import { findPrincipal, PrincipalTable } from './principal-table';
import { Section, sectionNames } from './section';
import { TensorView } from './tensor-view';

interface FiguresSectionProps {
  measurement: Measurement;
  statement: StatementRecord | undefined;
  shellFault: string | undefined;
  /** Some shells have densities of their own, or are left out. */
  isMixed: boolean;
  /** Undefined where the reader may change nothing. */
  editor: SettingEditor | undefined;
}

export function FiguresSection({ measurement: { soundness, examined }, statement, shellFault, isMixed, editor }: FiguresSectionProps) {
  const principal = statement && findPrincipal(statement);
  const complete = statement?.massKg !== null && statement !== undefined;
  const uncertainty = statement?.uncertainty ?? null;
  const aside = `${isMixed ? 'shell by shell' : 'of a uniform body'}, about its centre of mass, axes of the mesh frame${uncertainty ? '; ± with k = 2' : ''}`;
  return (
    <Section name={sectionNames.figures} aside={complete && aside}>
      {!complete && <NoFigures soundness={soundness} statement={statement} shellFault={shellFault} editor={editor} />}
      {statement && soundness.defensible && <HeadFigures statement={statement} isExamining={examined === 'integrals'} />}
      {statement?.centreOfMassM && <Balance box={statement.boundingBoxM} centreM={statement.centreOfMassM} uncertaintyM={uncertainty?.centreOfMassM ?? null} />}
      {statement?.inertiaAtCentreOfMassKgM2 && principal && (
        <div className="turning">
          <TensorView tensor={statement.inertiaAtCentreOfMassKgM2} uncertainty={uncertainty?.inertiaAtCentreOfMassKgM2 ?? null} />
          <PrincipalTable principal={principal} uncertainty={uncertainty} />
        </div>
      )}
    </Section>
  );
}

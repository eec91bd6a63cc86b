import { Button } from '@blueprintjs/core';
import { StatusTag } from '../../../components/status-tag';
import { describeLeft, describeStep, type ChangeSteps, type ChangeStepsState } from '../model/change-steps';

/** What was done last with several parts, and the way back; it stays until it is put away or something else is done. */
export function StepLine({ steps, state }: { steps: ChangeSteps; state: ChangeStepsState }) {
  const { last, problem, canUndo, canRedo, isBusy } = state;
  const left = last?.step.kind === 'setting' ? describeLeft(last.step.change) : '';
  const isOpen = isBusy || last !== undefined || problem !== undefined;
  return (
    <div className={isOpen ? 'step-line' : undefined}>
      <div role="status" className="step-line-words">
        {isBusy ? (
          <StatusTag tone="busy" plain>
            Changing the parts, and what follows from them
          </StatusTag>
        ) : problem !== undefined ? (
          <StatusTag tone="wrong" plain>
            {problem}
          </StatusTag>
        ) : (
          last && (
            <span>
              {describeStep(last)} {left && <span className="soft">{left}</span>}
            </span>
          )
        )}
      </div>
      {isOpen && canUndo && (
        <Button size="small" disabled={isBusy} onClick={() => void steps.undo()}>
          Undo <kbd>Ctrl Z</kbd>
        </Button>
      )}
      {isOpen && canRedo && (
        <Button size="small" disabled={isBusy} onClick={() => void steps.redo()}>
          Do again <kbd>Ctrl Shift Z</kbd>
        </Button>
      )}
      {isOpen && !isBusy && (
        <Button size="small" variant="minimal" onClick={steps.dismiss}>
          Put away
        </Button>
      )}
    </div>
  );
}

import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { useStore } from '../../../lib/store';
import { createChangeSteps, type ChangeSteps } from '../model/change-steps';
import { StepLine } from './step-line';

function Line({ steps }: { steps: ChangeSteps }) {
  return <StepLine steps={steps} state={useStore(steps)} />;
}

function open(): ChangeSteps {
  const moved = (parts: object): Promise<{ ids: string[] }> => Promise.resolve({ ids: 'ids' in parts ? (parts.ids as string[]) : [] });
  const steps = createChangeSteps({ undo: () => Promise.reject(new Error('unused')), remove: moved, restore: moved, isPassing: () => false, describe: String });
  render(<Line steps={steps} />);
  return steps;
}

describe('the line about what was done last', () => {
  afterEach(cleanup);
  it('says that something is under way, then what was done, and offers the way back', async () => {
    const steps = open();
    const under = steps.take(() => Promise.resolve({ kind: 'deleted', ids: ['a', 'b'] }));
    expect(await screen.findByText('Changing the parts, and what follows from them')).toBeTruthy();
    await under;
    expect(await screen.findByText('2 parts deleted; restorable for 30 days.')).toBeTruthy();
    fireEvent.click(screen.getByRole('button', { name: /Undo/ }));
    expect(await screen.findByText('2 parts restored.')).toBeTruthy();
    expect(screen.getByRole('button', { name: /Do again/ })).toBeTruthy();
  });
  it('can be put away; the way back by the key stays', async () => {
    const steps = open();
    await steps.take(() => Promise.resolve({ kind: 'deleted', ids: ['a'] }));
    fireEvent.click(await screen.findByRole('button', { name: 'Put away' }));
    expect(screen.queryByText(/deleted/)).toBeNull();
    expect(steps.get().canUndo).toBe(true);
  });
});

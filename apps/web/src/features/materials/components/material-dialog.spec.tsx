import type { CreateMaterialRequest } from '@masswright/contracts';
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { MaterialDialog } from './material-dialog';

function open(): CreateMaterialRequest[] {
  const sent: CreateMaterialRequest[] = [];
  render(<MaterialDialog material={undefined} isOpen isBusy={false} error={null} onSubmit={(material) => sent.push(material)} onClose={() => undefined} />);
  return sent;
}
const type = (label: string, value: string) => fireEvent.change(screen.getByLabelText(label), { target: { value } });
const submit = () => fireEvent.click(screen.getByRole('button', { name: 'Add the material' }));

describe('the dialog of a material', () => {
  afterEach(cleanup);

  it('puts the focus in the first field that is wrong, and sends nothing', () => {
    const sent = open();
    screen.getByLabelText('Source').focus();
    submit();
    expect(document.activeElement).toBe(screen.getByLabelText('Name'));
    type('Name', 'Housing alloy');
    submit();
    expect(document.activeElement).toBe(screen.getByLabelText('Density'));
    type('Density', '2.7 g/cm3');
    submit();
    expect(document.activeElement).toBe(screen.getByLabelText('Spread ±'));
    expect(sent).toEqual([]);
  });

  it('reads a spread in per cent anew when the density is changed after it', () => {
    const sent = open();
    type('Name', 'Housing alloy');
    type('Density', '2.7 g/cm3');
    type('Spread ±', '1 %');
    type('Density', '2000 kg/m3');
    submit();
    expect(sent).toMatchObject([{ densityKgM3: 2000, densitySpreadKgM3: 20 }]);
  });
});

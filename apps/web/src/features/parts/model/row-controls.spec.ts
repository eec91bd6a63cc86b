import { afterEach, describe, expect, it } from 'vitest';
import { findEntry, findRowElement, findStepInRow, listControls } from './row-controls';

function makeRow(content: string): HTMLElement {
  document.body.innerHTML = `<div data-index="3">${content}</div>`;
  const row = document.querySelector<HTMLElement>('[data-index]');
  if (!row) throw new Error('There is no row.');
  return row;
}
const doubtful = '<a href="/parts/1">Drum</a><button>Yes</button><button disabled>Wait</button><button>Keep</button>';

describe('the keyboard in a row', () => {
  afterEach(() => document.body.replaceChildren());
  it('enters it at its first button, or at its link where it has none', () => {
    const row = makeRow(doubtful);
    expect(findEntry(row, 'F2')?.textContent).toBe('Yes');
    expect(findEntry(row, 'ArrowRight')?.textContent).toBe('Yes');
    const quiet = makeRow('<a href="/parts/1">Drum</a>');
    expect(findEntry(quiet, 'F2')?.textContent).toBe('Drum');
    expect(findEntry(quiet, 'ArrowRight')).toBeUndefined();
    expect(findEntry(undefined, 'F2')).toBeUndefined();
  });
  it('goes from one thing to the next that can be done, and back to the list', () => {
    const row = makeRow(doubtful);
    const [link, yes, keep] = listControls(row);
    if (!link || !yes || !keep) throw new Error('A control is missing.');
    expect(findStepInRow(yes, row, 'ArrowRight')).toBe(keep);
    expect(findStepInRow(keep, row, 'ArrowRight')).toBe('own');
    expect(findStepInRow(yes, row, 'ArrowLeft')).toBe(link);
    expect(findStepInRow(link, row, 'ArrowLeft')).toBe('list');
    expect(findStepInRow(keep, row, 'Escape')).toBe('list');
  });
  it('a button answers Space and Enter, a link only Enter: Space selects its row', () => {
    const row = makeRow(doubtful);
    const [link, yes] = listControls(row);
    if (!link || !yes) throw new Error('A control is missing.');
    expect([findStepInRow(yes, row, ' '), findStepInRow(yes, row, 'Enter'), findStepInRow(yes, row, 'Delete')]).toEqual(['own', 'own', 'own']);
    expect([findStepInRow(link, row, ' '), findStepInRow(link, row, 'Enter')]).toEqual([undefined, 'own']);
    expect(findStepInRow(yes, row, 'ArrowDown')).toBeUndefined();
  });
  it('what is drawn outside of the rows is in none', () => {
    const row = makeRow(doubtful);
    expect(findRowElement(row.firstElementChild ?? document.body)).toBe(row);
    expect(findRowElement(document.body)).toBeUndefined();
  });
});

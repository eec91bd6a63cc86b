/** The row of the list that something stands in; undefined where it is in none, as in a menu that is drawn elsewhere. */
export function findRowElement(target: EventTarget): HTMLElement | undefined {
  return target instanceof Element ? (target.closest<HTMLElement>('[data-index]') ?? undefined) : undefined;
}

/** What can be done in a row, in its order: its link, and its buttons. */
export function listControls(row: Element | null | undefined): HTMLElement[] {
  return [...(row?.querySelectorAll<HTMLElement>('a[href], button:not(:disabled)') ?? [])];
}

const isButton = (element: Element): boolean => element.tagName === 'BUTTON';

/** The first thing that a row offers, which is its link where it has no button; `key` is the one that asks for it. */
export function findEntry(row: Element | null | undefined, key: string): HTMLElement | undefined {
  const controls = listControls(row);
  const button = controls.find(isButton);
  // The arrow has the page scroll sideways where there is nothing to answer.
  if (key === 'ArrowRight') return button;
  return key === 'F2' ? (button ?? controls[0]) : undefined;
}

/**
 * Where a key leads from a control of a row: to another one, back to the list, or nowhere else since the control answers it by itself.
 * Undefined where the key means what it means in the list.
 */
export function findStepInRow(control: Element, row: Element, key: string): HTMLElement | 'list' | 'own' | undefined {
  const controls = listControls(row);
  const place = controls.findIndex((one) => one === control);
  switch (key) {
    case 'Escape':
      return 'list';
    case 'ArrowRight':
      return controls[place + 1] ?? 'own';
    case 'ArrowLeft':
      return controls[place - 1] ?? 'list';
    case 'Enter':
      return 'own';
    case ' ':
    case 'Delete':
      return isButton(control) ? 'own' : undefined;
    default:
      return undefined;
  }
}

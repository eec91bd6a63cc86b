import { Dialog } from '@blueprintjs/core';
import { useEffect } from 'react';
import { closeKeysDialog, openKeysDialog, useKeysDialog } from './keys-dialog-state';

const keys: readonly { press: readonly string[]; effect: string }[] = [
  { press: ['/'], effect: 'Filter the parts' },
  { press: ['↑', '↓'], effect: 'Go from part to part in the list; Page and Home, End go further' },
  { press: ['Space'], effect: 'Select the part, or leave it out' },
  { press: ['Shift', '↑', '↓'], effect: 'Select from here to there' },
  { press: ['Ctrl', 'A'], effect: 'Select all that the filter leaves' },
  { press: ['Enter'], effect: 'Open the part' },
  { press: ['Del'], effect: 'Delete what is selected; it can be restored' },
  { press: ['Ctrl', 'Z'], effect: 'Undo the last change' },
  { press: ['Ctrl', 'Shift', 'Z'], effect: 'Do it again' },
  { press: ['←', '→'], effect: 'Choose another axis, once the axis bar has the focus' },
  { press: ['Tab'], effect: 'Go to the next field or button' },
  { press: ['Esc'], effect: 'Close a dialog or a menu, clear a selection' },
  { press: ['?'], effect: 'Show these keys' },
];

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest('input:not([type=radio], [type=checkbox]), textarea, select') !== null;
}

/** The keys that do something, for whoever presses a question mark. */
export function KeysDialog() {
  const isOpen = useKeysDialog();
  useEffect(() => {
    const open = (event: KeyboardEvent): void => {
      if (event.key !== '?' || event.ctrlKey || event.metaKey || isTyping(event.target)) return;
      event.preventDefault();
      openKeysDialog();
    };
    document.addEventListener('keydown', open);
    return () => {
      document.removeEventListener('keydown', open);
      closeKeysDialog();
    };
  }, []);
  return (
    <Dialog title="Keys" isOpen={isOpen} onClose={closeKeysDialog} className="dialog-narrow">
      <dl className="bp6-dialog-body keys">
        {keys.map(({ press, effect }) => (
          <div key={effect}>
            <dt>
              {press.map((key) => (
                <kbd key={key}>{key}</kbd>
              ))}
            </dt>
            <dd>{effect}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}

import { InputGroup } from '@blueprintjs/core';
import { formatCount } from '@masswright/units';
import { memo, useEffect, useRef, useState } from 'react';
import type { ListView } from '../model/list-address';
import { listChips, type ChipCounts } from '../model/state-words';

const typingMs = 150;

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest('input:not([type=radio], [type=checkbox]), textarea, select') !== null;
}

/** Text by which the list is narrowed; sent on once the person stops to type for a moment. */
function TextFilter({ text, onChange }: { text: string; onChange: (text: string) => void }) {
  const [typed, setTyped] = useState(text);
  const [known, setKnown] = useState(text);
  const field = useRef<HTMLInputElement>(null);
  if (text !== known) {
    // Changed from elsewhere: by the back button, or by clearing the filter.
    setKnown(text);
    setTyped(text);
  }
  useEffect(() => {
    if (typed.trim() === text) return;
    const timer = setTimeout(() => {
      setKnown(typed.trim());
      onChange(typed.trim());
    }, typingMs);
    return () => clearTimeout(timer);
  }, [typed, text, onChange]);
  useEffect(() => {
    const focus = (event: KeyboardEvent): void => {
      if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target) || document.querySelector('.bp6-dialog')) return;
      event.preventDefault();
      field.current?.select();
    };
    document.addEventListener('keydown', focus);
    return () => document.removeEventListener('keydown', focus);
  }, []);
  return (
    <div role="search" className="part-filter-text">
      <InputGroup
        inputRef={field}
        type="search"
        value={typed}
        onValueChange={setTyped}
        onKeyDown={(event) => {
          if (event.key === 'Escape' && typed !== '') setTyped('');
        }}
        maxLength={200}
        placeholder="Filter by name, number, file or material"
        aria-label="Filter the parts"
        aria-keyshortcuts="/"
        autoComplete="off"
        spellCheck={false}
        rightElement={typed === '' ? <kbd className="part-filter-key">/</kbd> : undefined}
      />
    </div>
  );
}

interface PartFilterProps {
  view: ListView;
  counts: ChipCounts['counts'];
  deleted: number | undefined;
  onChange: (change: Partial<ListView>) => void;
  onText: (text: string) => void;
}

/** Narrows the list by text and by state. */
export const PartFilterBar = memo(function PartFilterBar({ view, counts, deleted: countDeleted, onChange, onText }: PartFilterProps) {
  const chips = listChips({ counts, deleted: countDeleted }, view);
  return (
    <div className="part-filter">
      <TextFilter text={view.text} onChange={onText} />
      <div role="group" aria-label="Filter by state" className="part-chips">
        {chips.map(({ name, count, states, deleted, isSingle }) => {
          const isChosen = view.states === states && view.deleted === deleted;
          return (
            <button
              key={`${states} ${String(deleted)}`}
              type="button"
              aria-pressed={isChosen}
              className={`part-chip${isSingle ? ' part-chip-single' : ''}`}
              onClick={() => onChange({ states: isChosen && isSingle ? '' : states, deleted })}
            >
              {name} {count !== undefined && <span className="figure">{formatCount(count)}</span>}
            </button>
          );
        })}
      </div>
    </div>
  );
});

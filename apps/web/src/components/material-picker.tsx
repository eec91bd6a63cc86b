import { InputGroup, PopoverNext } from '@blueprintjs/core';
import type { Material, NamedMaterial } from '@masswright/contracts';
import { useEffect, useId, useRef, useState, type KeyboardEvent, type RefObject } from 'react';
import { filterMaterials, groupMaterials, writeSpreadDensity } from '../lib/material-words';
import './material-picker.css';

interface MaterialPickerProps {
  /** The library; archived ones are not offered. */
  materials: readonly Material[];
  value: NamedMaterial | null;
  /** Null where the person takes the name away by emptying the field. */
  onChange: (material: Material | null) => void;
  /** Said by the field itself; who shows a label of their own beside it says the same words. */
  label: string;
  placeholder?: string;
  disabled?: boolean;
  autoFocus?: boolean;
}

/** A material out of the library, by a few letters of its name: arrows choose, Enter takes, Escape leaves it as it was. */
export function MaterialPicker({ materials, value, onChange, label, placeholder = 'Search the library', disabled, autoFocus }: MaterialPickerProps) {
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  /** What is being typed; undefined while the chosen name stands there. */
  const [typed, setTyped] = useState<string>();
  const [isOpen, setIsOpen] = useState(false);
  const [current, setCurrent] = useState(0);
  const groups = groupMaterials(filterMaterials(materials.filter(({ archivedAt }) => archivedAt === null), typed ?? ''));
  const options = groups.flatMap(({ items }) => items);
  const marked = options[Math.min(current, options.length - 1)];

  const open = (): void => {
    if (isOpen) return;
    setIsOpen(true);
    setCurrent(Math.max(0, options.findIndex((option) => option.id === value?.id)));
  };
  const close = (): void => {
    setIsOpen(false);
    setTyped(undefined);
  };
  const take = (material: Material): void => {
    onChange(material);
    close();
    input.current?.focus();
  };
  const leave = (): void => {
    if (typed?.trim() === '' && value !== null) onChange(null);
    close();
  };
  const press = (event: KeyboardEvent): void => {
    if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      event.preventDefault();
      if (!isOpen) open();
      else if (options.length > 0) setCurrent((Math.min(current, options.length - 1) + (event.key === 'ArrowDown' ? 1 : options.length - 1)) % options.length);
    } else if (event.key === 'Enter' && isOpen) {
      event.preventDefault();
      if (typed?.trim() === '') leave();
      else if (marked) take(marked);
    } else if (event.key === 'Escape' && isOpen) {
      // The dialog around it stays open.
      event.stopPropagation();
      event.preventDefault();
      close();
    }
  };

  return (
    <PopoverNext
      isOpen={isOpen}
      onInteraction={(next) => (next ? open() : undefined)}
      onClose={close}
      interactionKind="click"
      openOnTargetFocus={false}
      autoFocus={false}
      enforceFocus={false}
      shouldReturnFocusOnClose={false}
      canEscapeKeyClose={false}
      animation="minimal"
      transitionDuration={0}
      arrow={false}
      placement="bottom-start"
      popoverClassName="material-list-popover"
      className="material-picker"
      content={<MaterialOptions id={id} label={label} groups={groups} marked={marked} chosenId={value?.id} onTake={take} onMark={(material) => setCurrent(options.indexOf(material))} field={input} />}
      // Opening is the field's own affair, and what is said of it, too.
      renderTarget={({ isOpen: _, ref, onClick: __, onKeyDown: ___, 'aria-expanded': ____, 'aria-haspopup': _____, ...target }) => (
        <span {...target} ref={ref}>
          <InputGroup
            inputRef={input}
            role="combobox"
            aria-label={label}
            aria-expanded={isOpen}
            aria-controls={`${id}-list`}
            aria-autocomplete="list"
            aria-activedescendant={isOpen && marked ? `${id}-${marked.id}` : undefined}
            value={typed ?? value?.name ?? ''}
            placeholder={placeholder}
            disabled={disabled}
            autoFocus={autoFocus}
            autoComplete="off"
            spellCheck={false}
            onClick={open}
            onBlur={leave}
            onKeyDown={press}
            onValueChange={(text) => {
              setTyped(text);
              setCurrent(0);
              setIsOpen(true);
            }}
          />
        </span>
      )}
    />
  );
}

interface MaterialOptionsProps {
  id: string;
  label: string;
  groups: ReturnType<typeof groupMaterials<Material>>;
  marked: Material | undefined;
  chosenId: string | undefined;
  onTake: (material: Material) => void;
  onMark: (material: Material) => void;
  field: RefObject<HTMLInputElement | null>;
}

function MaterialOptions({ id, label, groups, marked, chosenId, onTake, onMark, field }: MaterialOptionsProps) {
  const list = useRef<HTMLDivElement>(null);
  const markedId = marked && `${id}-${marked.id}`;
  useEffect(() => {
    if (markedId !== undefined) document.getElementById(markedId)?.scrollIntoView({ block: 'nearest' });
  }, [markedId]);
  return (
    // The field keeps the focus, so that the list never takes part in its being left.
    <div
      className="material-list"
      ref={list}
      style={{ minWidth: field.current?.offsetWidth }}
      onMouseDown={(event) => event.preventDefault()}
    >
      <div role="listbox" id={`${id}-list`} aria-label={label} className="material-options">
        {groups.map(({ group, name, items }) => (
          <div key={group} role="group" aria-label={name}>
            <p className="caption" aria-hidden="true">
              {name}
            </p>
            {items.map((material) => (
              <div
                key={material.id}
                id={`${id}-${material.id}`}
                role="option"
                aria-selected={material.id === chosenId}
                className={`material-option${material === marked ? ' material-option-marked' : ''}`}
                onMouseMove={() => onMark(material)}
                onClick={() => onTake(material)}
              >
                <span>{material.name}</span>
                <span className="figure soft">{writeSpreadDensity(material)}</span>
              </div>
            ))}
          </div>
        ))}
      </div>
      {groups.length === 0 && (
        <p className="material-none soft" role="status">
          No material has that in its name. Type the density instead, or add the material to the library.
        </p>
      )}
    </div>
  );
}

import { Button, PopoverNext, type ButtonProps } from '@blueprintjs/core';
import { useRef, useState, type KeyboardEvent, type ReactElement } from 'react';
import './menu-button.css';

export interface MenuItem {
  label: string;
  /** What tells it from its neighbours, softer beside it. */
  note?: string;
  onChoose?: () => void;
  /** Makes it a link: what it leads to is saved as a file. */
  download?: string;
}

interface MenuButtonProps extends Pick<ButtonProps, 'size' | 'variant' | 'disabled' | 'tabIndex'> {
  label: string;
  /** Where the label alone does not say of what. */
  spoken?: string;
  items: readonly MenuItem[];
}

/** A button that opens a short list of things to do; arrows go through it. */
export function MenuButton({ label, spoken, items, ...button }: MenuButtonProps) {
  return (
    <PanelButton label={label} spoken={spoken} popup="menu" {...button}>
      {(close) => <Menu label={spoken ?? label} items={items} onClose={close} />}
    </PanelButton>
  );
}

interface PanelButtonProps extends Omit<MenuButtonProps, 'items'> {
  popup?: 'menu' | 'dialog';
  children: (close: () => void) => ReactElement;
}

/** A button that opens a small panel under it. */
export function PanelButton({ label, spoken, popup = 'dialog', children, ...button }: PanelButtonProps) {
  const [isOpen, setIsOpen] = useState(false);
  const close = (): void => setIsOpen(false);
  return (
    <PopoverNext
      isOpen={isOpen}
      onInteraction={setIsOpen}
      animation="minimal"
      arrow={false}
      placement="bottom-start"
      content={isOpen ? children(close) : <></>}
      // What it says of itself belongs to the button, not to the element around it.
      renderTarget={({ isOpen: _, ref, 'aria-expanded': __, 'aria-haspopup': ___, ...target }) => (
        <span {...target} ref={ref} className="menu-button">
          <Button {...button} aria-haspopup={popup} aria-expanded={isOpen} aria-label={spoken}>
            {label} <span className="menu-button-mark" aria-hidden="true" />
          </Button>
        </span>
      )}
    />
  );
}

function Menu({ label, items, onClose }: { label: string; items: readonly MenuItem[]; onClose: () => void }) {
  const list = useRef<HTMLDivElement>(null);
  const step = (event: KeyboardEvent): void => {
    const move = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (move === undefined) return;
    event.preventDefault();
    const all = [...(list.current?.querySelectorAll<HTMLElement>('[role=menuitem]') ?? [])];
    const at = all.findIndex((item) => item === document.activeElement);
    all[(at + move + all.length) % all.length]?.focus();
  };
  return (
    <div role="menu" aria-label={label} className="menu" ref={list} onKeyDown={step}>
      {items.map((item, index) => {
        const content = (
          <>
            <span>{item.label}</span>
            {item.note && <span className="soft">{item.note}</span>}
          </>
        );
        const choose = (): void => {
          item.onChoose?.();
          onClose();
        };
        return item.download === undefined ? (
          <button type="button" role="menuitem" key={item.label} autoFocus={index === 0} onClick={choose}>
            {content}
          </button>
        ) : (
          <a role="menuitem" key={item.label} autoFocus={index === 0} href={item.download} download onClick={choose}>
            {content}
          </a>
        );
      })}
    </div>
  );
}

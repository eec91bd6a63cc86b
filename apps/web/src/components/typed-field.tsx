import { FormGroup, InputGroup } from '@blueprintjs/core';
import { useId, useState, type KeyboardEvent, type ReactNode } from 'react';

/** What a text means; nothing typed is null. */
export type ReadField<Value> = { value: Value | null; error?: undefined } | { value?: undefined; error: string };

interface TypedFieldProps<Value> {
  label: string;
  value: Value | null;
  write: (value: Value | null) => string;
  read: (text: string) => ReadField<Value>;
  /** What was understood, in other words than were typed. */
  describe: (value: Value, text: string) => string;
  emptyHint: string;
  placeholder: string;
  /** What follows from the value; it stands away while what is typed is not that value. */
  consequence?: ReactNode;
  onChange: (value: Value | null) => void;
}

/**
 * A quantity of a setting, typed. What is typed counts as soon as it can be read; half a word is not yet an error while the person is typing,
 * and an emptied field takes the quantity away only when they leave it.
 */
export function TypedField<Value>({ label, value, write, read, describe, emptyHint, placeholder, consequence, onChange }: TypedFieldProps<Value>) {
  const id = useId();
  const [text, setText] = useState(() => write(value));
  const [shown, setShown] = useState(() => write(value));
  const [isTyping, setIsTyping] = useState(false);
  const written = write(value);
  if (written !== shown) {
    // Changed from elsewhere: undone, or by another person.
    setShown(written);
    setText(written);
  }
  const commit = (typed: string, finished: boolean): void => {
    // Fewer digits are shown than are stored: what nobody has changed is not to be stored with fewer.
    if (typed === written) return;
    const { value: meant } = read(typed);
    if (meant === undefined || (meant === null && !finished)) return;
    setShown(write(meant));
    onChange(meant);
  };
  const finish = (): void => {
    setIsTyping(false);
    commit(text, true);
  };
  const meant = read(text);
  const error = isTyping ? undefined : meant.error;
  const understood = meant.error !== undefined ? '…' : meant.value === null ? emptyHint : describe(meant.value, text);
  // What can't be read changes nothing: said, so that nobody takes the figures below for those of the text.
  const kept = error && value !== null ? ` Still in force: ${written}.` : '';
  return (
    <>
      <FormGroup
        intent={error ? 'danger' : 'none'}
        helperText={
          <span id={`${id}-helper`} role="status">
            {error ? `${error}${kept}` : understood}
          </span>
        }
      >
        <InputGroup
          value={text}
          onValueChange={(typed) => {
            setIsTyping(true);
            setText(typed);
            commit(typed, false);
          }}
          onBlur={finish}
          onKeyDown={(event: KeyboardEvent) => {
            if (event.key === 'Enter') finish();
          }}
          placeholder={placeholder}
          autoComplete="off"
          spellCheck={false}
          inputClassName="figure"
          intent={error ? 'danger' : 'none'}
          aria-label={label}
          aria-invalid={error ? true : undefined}
          aria-describedby={`${id}-helper`}
        />
      </FormGroup>
      {meant.error === undefined && meant.value !== null && consequence}
    </>
  );
}

import { useId } from 'react';

export interface Choice<Value extends string> {
  value: Value;
  label: string;
  /** What the label stands for, where it is only a letter. */
  spoken?: string;
}

interface ChoiceBarProps<Value extends string> {
  label: string;
  choices: readonly Choice<Value>[];
  value: Value;
  onChange: (value: Value) => void;
}

/** One of a few, side by side: native radio buttons, so that arrows and Tab do what they do everywhere. */
export function ChoiceBar<Value extends string>({ label, choices, value, onChange }: ChoiceBarProps<Value>) {
  const name = useId();
  return (
    <fieldset className="choice-bar">
      <legend className="hidden-visually">{label}</legend>
      {choices.map((choice) => (
        <label key={choice.value} className="choice">
          <input
            type="radio"
            name={name}
            value={choice.value}
            checked={choice.value === value}
            aria-label={choice.spoken}
            onChange={() => onChange(choice.value)}
          />
          <span aria-hidden={choice.spoken ? true : undefined}>{choice.label}</span>
        </label>
      ))}
    </fieldset>
  );
}

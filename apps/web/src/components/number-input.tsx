import { InputGroup } from '@blueprintjs/core';

interface NumberInputProps {
  text: string;
  onChange: (text: string) => void;
  label: string;
  error?: string;
  width?: number;
}

/** A short field for one number; its error is said by whoever groups it with others. */
export function NumberInput({ text, onChange, label, error, width = 110 }: NumberInputProps) {
  return (
    <span className="number-input" style={{ width }}>
      <InputGroup
        value={text}
        onValueChange={onChange}
        autoComplete="off"
        spellCheck={false}
        inputMode="decimal"
        inputClassName="figure"
        aria-label={label}
        aria-invalid={error ? true : undefined}
        intent={error ? 'danger' : 'none'}
      />
    </span>
  );
}

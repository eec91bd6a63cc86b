import { FormGroup, InputGroup } from '@blueprintjs/core';
import { useId, type KeyboardEvent } from 'react';
import { describeDensity, readDensity } from '../lib/density';

interface DensityFieldProps {
  text: string;
  onChange: (text: string) => void;
  label?: string;
  ariaLabel?: string;
  /** Said while nothing is typed. */
  emptyHint: string;
  /** Said in its place, as an error, where a density must be given and none is. */
  missing?: string;
  /** False while a person is still typing. */
  showError?: boolean;
  onBlur?: () => void;
  onKeyDown?: (event: KeyboardEvent) => void;
}

/** A density typed with its unit; what was understood is said under it. */
export function DensityField({ text, onChange, label = 'Density', ariaLabel, emptyHint, missing, showError = true, onBlur, onKeyDown }: DensityFieldProps) {
  const id = useId();
  const typed = readDensity(text);
  const error = (showError ? typed.error : undefined) ?? (text.trim() === '' ? missing : undefined);
  const understood = typed.densityKgM3 ? describeDensity(typed.densityKgM3, text) : text.trim() === '' ? emptyHint : '…';
  return (
    <FormGroup
      label={label}
      labelFor={id}
      intent={error ? 'danger' : 'none'}
      helperText={
        <span id={`${id}-helper`} role="status">
          {error ?? understood}
        </span>
      }
    >
      <InputGroup
        id={id}
        value={text}
        onValueChange={onChange}
        onBlur={onBlur}
        onKeyDown={onKeyDown}
        placeholder="2.7 g/cm3"
        autoComplete="off"
        spellCheck={false}
        inputClassName="figure"
        intent={error ? 'danger' : 'none'}
        aria-label={ariaLabel}
        aria-invalid={error ? true : undefined}
        aria-describedby={`${id}-helper`}
      />
    </FormGroup>
  );
}

import { FormGroup, InputGroup } from '@blueprintjs/core';
import { useId, type HTMLInputTypeAttribute } from 'react';
import type { FieldError, UseFormRegisterReturn } from 'react-hook-form';

interface FormFieldProps {
  label: string;
  registration: UseFormRegisterReturn;
  error?: FieldError;
  hint?: string;
  type?: HTMLInputTypeAttribute;
  autoComplete?: string;
  autoFocus?: boolean;
  disabled?: boolean;
  placeholder?: string;
}

/** A labelled text field of a form; its error or hint is read out with it. */
export function FormField({ label, registration, error, hint, type = 'text', ...rest }: FormFieldProps) {
  const id = useId();
  const helperId = `${id}-helper`;
  const helper = error?.message ?? hint;
  const { ref, ...field } = registration;
  return (
    <FormGroup label={label} labelFor={id} intent={error ? 'danger' : 'none'} helperText={helper ? <span id={helperId}>{helper}</span> : undefined}>
      <InputGroup
        {...field}
        {...rest}
        inputRef={ref}
        id={id}
        type={type}
        size="large"
        intent={error ? 'danger' : 'none'}
        aria-invalid={error ? true : undefined}
        aria-describedby={helper ? helperId : undefined}
      />
    </FormGroup>
  );
}

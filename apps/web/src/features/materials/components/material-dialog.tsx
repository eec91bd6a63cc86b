import { Button, Dialog, DialogFooter, FormGroup, HTMLSelect, InputGroup } from '@blueprintjs/core';
import { materialGroups, materialGroup as groupSchema, type CreateMaterialRequest, type Material } from '@masswright/contracts';
import { useId, useRef, useState, type ReactNode } from 'react';
import { flushSync } from 'react-dom';
import { ChoiceBar } from '../../../components/choice-bar';
import { DensityField } from '../../../components/density-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { materialGroupNames } from '../../../lib/material-words';
import { emptyMaterial, readMaterial, writeMaterial, type MaterialTexts } from '../model/material-form';

interface MaterialDialogProps {
  /** The one that is changed; undefined for a new one. */
  material: Material | undefined;
  isOpen: boolean;
  isBusy: boolean;
  error: unknown;
  onSubmit: (material: CreateMaterialRequest) => void;
  onClose: () => void;
}

export function MaterialDialog(props: MaterialDialogProps) {
  return (
    <Dialog title={props.material ? `Change ${props.material.name}` : 'New material'} isOpen={props.isOpen} onClose={props.onClose} className="dialog-narrow">
      <MaterialForm {...props} />
    </Dialog>
  );
}

interface FieldProps {
  label: string;
  text: string;
  error: string | undefined;
  hint?: string;
  placeholder?: string;
  autoFocus?: boolean;
  onChange: (text: string) => void;
}

function Field({ label, text, error, hint, placeholder, autoFocus, onChange }: FieldProps) {
  const id = useId();
  const helper = error ?? hint;
  return (
    <FormGroup label={label} labelFor={id} intent={error ? 'danger' : 'none'} helperText={helper && <span id={`${id}-helper`}>{helper}</span>}>
      <InputGroup
        id={id}
        value={text}
        onValueChange={onChange}
        placeholder={placeholder}
        autoFocus={autoFocus}
        autoComplete="off"
        intent={error ? 'danger' : 'none'}
        aria-invalid={error ? true : undefined}
        aria-describedby={helper ? `${id}-helper` : undefined}
      />
    </FormGroup>
  );
}

function Labelled({ label, children }: { label: string; children: ReactNode }) {
  return <FormGroup label={label}>{children}</FormGroup>;
}

function MaterialForm({ material, isBusy, error, onSubmit, onClose }: MaterialDialogProps) {
  const [texts, setTexts] = useState<MaterialTexts>(() => (material ? writeMaterial(material) : emptyMaterial));
  const [asked, setAsked] = useState(false);
  const change = (changed: Partial<MaterialTexts>): void => setTexts({ ...texts, ...changed });
  const read = readMaterial(texts);
  const errors = asked ? read.errors : {};
  const form = useRef<HTMLFormElement>(null);
  return (
    <form
      ref={form}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        // At once, so that the wrong fields are marked as such when the first of them is looked for.
        flushSync(() => setAsked(true));
        if (read.material) onSubmit(read.material);
        else form.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
      }}
    >
      <div className="bp6-dialog-body">
        <Field label="Name" text={texts.name} error={errors.name} autoFocus onChange={(name) => change({ name })} />
        <Labelled label="Family">
          <HTMLSelect
            aria-label="Family"
            value={texts.group}
            options={materialGroups.map((value) => ({ value, label: materialGroupNames[value] }))}
            onChange={(event) => change({ group: groupSchema.parse(event.currentTarget.value) })}
          />
        </Labelled>
        <DensityField text={texts.density} onChange={(density) => change({ density })} showError={asked} missing={errors.density} emptyHint="With its unit: 2.7 g/cm3, 7850 kg/m3." />
        <Field
          label="Spread ±"
          text={texts.spread}
          error={errors.spread}
          placeholder="1 %"
          hint="Half the width of the interval that it lies in: 1 %, 27 kg/m3 or 0.03 g/cm3."
          onChange={(spread) => change({ spread })}
        />
        <Labelled label="Who says so">
          <ChoiceBar
            label="Who says so"
            choices={[
              { value: 'source', label: 'The source states it' },
              { value: 'judgement', label: 'Our judgement' },
            ]}
            value={texts.spreadBasis}
            onChange={(spreadBasis) => change({ spreadBasis })}
          />
        </Labelled>
        <Field label="Source" text={texts.source} error={errors.source} hint="Where the density comes from, in words." onChange={(source) => change({ source })} />
        {material && material.usedByParts > 0 && (
          <p className="soft">Parts that are set to it keep the density that they were made with; its page then shows, part by part, what the new one would move.</p>
        )}
        {error !== null && error !== undefined && <ProblemNotice error={error} />}
      </div>
      <DialogFooter
        actions={
          <>
            <Button onClick={onClose}>Cancel</Button>
            <Button type="submit" intent="primary" loading={isBusy}>
              {material ? 'Save' : 'Add the material'}
            </Button>
          </>
        }
      />
    </form>
  );
}

import { Button, Dialog, DialogFooter } from '@blueprintjs/core';
import type { Part, RenamePartRequest } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useRenamePart } from '../api/parts';

const resolver = createZodResolver<RenamePartRequest>(() => import('@masswright/contracts').then(({ renamePartRequest }) => renamePartRequest));

export function RenamePartDialog({ part, isOpen, onClose }: { part: Part; isOpen: boolean; onClose: () => void }) {
  return (
    <Dialog title="Rename the part" isOpen={isOpen} onClose={onClose} className="dialog-narrow">
      <NameForm part={part} onClose={onClose} />
    </Dialog>
  );
}

function NameForm({ part, onClose }: { part: Part; onClose: () => void }) {
  const rename = useRenamePart(part.id);
  const { register, handleSubmit, formState } = useForm<RenamePartRequest>({ resolver, defaultValues: { name: part.name } });
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((values) => rename.mutate(values, { onSuccess: onClose }))(event)}>
      <div className="bp6-dialog-body">
        <FormField label="Name" autoFocus autoComplete="off" registration={register('name')} error={formState.errors.name} />
        {rename.error && <ProblemNotice error={rename.error} />}
      </div>
      <DialogFooter
        actions={
          <>
            <Button onClick={onClose}>Cancel</Button>
            <Button type="submit" intent="primary" loading={rename.isPending}>
              Rename
            </Button>
          </>
        }
      />
    </form>
  );
}

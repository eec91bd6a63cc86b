import { Button, Dialog, DialogFooter } from '@blueprintjs/core';
import type { CreateProjectRequest } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';

const resolver = createZodResolver<CreateProjectRequest>(() => import('@masswright/contracts').then(({ createProjectRequest }) => createProjectRequest));

interface ProjectNameDialogProps {
  title: string;
  submitLabel: string;
  name: string;
  isOpen: boolean;
  isBusy: boolean;
  error: Error | null;
  onSubmit: (name: string) => void;
  onClose: () => void;
}

/** Asks for a project's name, of a new one or of one that is to be called otherwise. */
export function ProjectNameDialog(props: ProjectNameDialogProps) {
  return (
    <Dialog title={props.title} isOpen={props.isOpen} onClose={props.onClose} className="dialog-narrow">
      <NameForm {...props} />
    </Dialog>
  );
}

/** Apart from the dialog, so that each opening begins with the name as it is now. */
function NameForm({ submitLabel, name, isBusy, error, onSubmit, onClose }: ProjectNameDialogProps) {
  const { register, handleSubmit, formState } = useForm<CreateProjectRequest>({ resolver, defaultValues: { name } });
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((values) => onSubmit(values.name))(event)}>
      <div className="bp6-dialog-body">
        <FormField label="Name" autoFocus autoComplete="off" hint="As your drawings call it: Reel, mark 2." registration={register('name')} error={formState.errors.name} />
        {error && <ProblemNotice error={error} />}
      </div>
      <DialogFooter
        actions={
          <>
            <Button onClick={onClose}>Cancel</Button>
            <Button type="submit" intent="primary" loading={isBusy}>
              {submitLabel}
            </Button>
          </>
        }
      />
    </form>
  );
}

import { Button } from '@blueprintjs/core';
import type { PasswordResetCompletionRequest } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useCompletePasswordReset } from '../api/session';

type Form = Pick<PasswordResetCompletionRequest, 'password'>;
const resolver = createZodResolver<Form>(() =>
  import('@masswright/contracts').then(({ passwordResetCompletionRequest }) => passwordResetCompletionRequest.pick({ password: true })),
);

export function NewPasswordForm({ token, onDone }: { token: string; onDone: () => void }) {
  const complete = useCompletePasswordReset();
  const { register, handleSubmit, formState } = useForm<Form>({ resolver, defaultValues: { password: '' } });
  return (
    <form noValidate onSubmit={(event) => void handleSubmit(({ password }) => complete.mutate({ token, password }, { onSuccess: onDone }))(event)}>
      {complete.error && <ProblemNotice error={complete.error} />}
      <FormField
        label="New password"
        hint="At least 12 characters; a few words in a row are good."
        type="password"
        autoComplete="new-password"
        autoFocus
        registration={register('password')}
        error={formState.errors.password}
      />
      <Button type="submit" intent="primary" size="large" fill loading={complete.isPending}>
        Set the password
      </Button>
    </form>
  );
}

import { Button } from '@blueprintjs/core';
import type { PasswordResetRequest } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { Notice } from '../../../components/notice';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useRequestPasswordReset } from '../api/session';

const resolver = createZodResolver<PasswordResetRequest>(() => import('@masswright/contracts').then(({ passwordResetRequest }) => passwordResetRequest));

export function ForgottenPasswordForm() {
  const request = useRequestPasswordReset();
  const { register, handleSubmit, formState } = useForm<PasswordResetRequest>({ resolver, defaultValues: { email: '' } });
  if (request.data) {
    return (
      <Notice tone="agreement" live>
        <p>{request.data.message}</p>
      </Notice>
    );
  }
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((values) => request.mutate(values))(event)}>
      {request.error && <ProblemNotice error={request.error} />}
      <FormField label="E-mail" type="email" autoComplete="username" autoFocus registration={register('email')} error={formState.errors.email} />
      <Button type="submit" intent="primary" size="large" fill loading={request.isPending}>
        Send me a link
      </Button>
    </form>
  );
}

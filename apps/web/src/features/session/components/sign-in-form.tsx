import { Button } from '@blueprintjs/core';
import type { SignInRequest } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useSignIn } from '../api/session';

const resolver = createZodResolver<SignInRequest>(() => import('@masswright/contracts').then(({ signInRequest }) => signInRequest));

export function SignInForm({ onDone }: { onDone: () => void }) {
  const signIn = useSignIn();
  const { register, handleSubmit, formState } = useForm<SignInRequest>({ resolver, defaultValues: { email: '', password: '' } });
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((values) => signIn.mutate(values, { onSuccess: onDone }))(event)}>
      {signIn.error && <ProblemNotice error={signIn.error} />}
      <FormField label="E-mail" type="email" autoComplete="username" autoFocus registration={register('email')} error={formState.errors.email} />
      <FormField label="Password" type="password" autoComplete="current-password" registration={register('password')} error={formState.errors.password} />
      <Button type="submit" intent="primary" size="large" fill loading={signIn.isPending}>
        Sign in
      </Button>
    </form>
  );
}

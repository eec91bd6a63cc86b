import { Button } from '@blueprintjs/core';
import type { SignUpRequest } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useSignUp } from '../api/session';

const resolver = createZodResolver<SignUpRequest>(() => import('@masswright/contracts').then(({ signUpRequest }) => signUpRequest));

export function SignUpForm({ onDone }: { onDone: () => void }) {
  const signUp = useSignUp();
  const { register, handleSubmit, formState } = useForm<SignUpRequest>({
    resolver,
    defaultValues: { organisationName: '', name: '', email: '', password: '' },
  });
  const { errors } = formState;
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((values) => signUp.mutate(values, { onSuccess: onDone }))(event)}>
      {signUp.error && <ProblemNotice error={signUp.error} />}
      <FormField
        label="Organisation"
        hint="Your team or company. Colleagues are invited into it; nobody else sees what is in it."
        autoComplete="organization"
        autoFocus
        registration={register('organisationName')}
        error={errors.organisationName}
      />
      <FormField label="Your name" autoComplete="name" registration={register('name')} error={errors.name} />
      <FormField label="E-mail" type="email" autoComplete="username" registration={register('email')} error={errors.email} />
      <FormField
        label="Password"
        hint="At least 12 characters; a few words in a row are good."
        type="password"
        autoComplete="new-password"
        registration={register('password')}
        error={errors.password}
      />
      <Button type="submit" intent="primary" size="large" fill loading={signUp.isPending}>
        Open the organisation
      </Button>
    </form>
  );
}

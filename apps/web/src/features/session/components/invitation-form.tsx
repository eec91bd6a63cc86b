import { Button } from '@blueprintjs/core';
import type { AcceptInvitationRequest, OpenInvitation } from '@masswright/contracts';
import { useForm } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { ProblemNotice } from '../../../components/problem-notice';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useAcceptInvitation } from '../api/session';

interface Form {
  name: string;
  password: string;
}

const newPersonResolver = createZodResolver<Form>(() => import('./invitation-schemas').then(({ newPersonForm }) => newPersonForm));
const knownPersonResolver = createZodResolver<Form>(() => import('./invitation-schemas').then(({ knownPersonForm }) => knownPersonForm));

interface InvitationFormProps {
  token: string;
  invitation: OpenInvitation;
  onDone: () => void;
}

export function InvitationForm({ token, invitation, onDone }: InvitationFormProps) {
  const accept = useAcceptInvitation();
  const known = invitation.hasAccount;
  const { register, handleSubmit, formState } = useForm<Form>({
    resolver: known ? knownPersonResolver : newPersonResolver,
    defaultValues: { name: '', password: '' },
  });
  const submit = ({ name, password }: Form): void => {
    const request: AcceptInvitationRequest = known ? { as: 'known-person', token, password } : { as: 'new-person', token, name, password };
    accept.mutate(request, { onSuccess: onDone });
  };
  return (
    <form noValidate onSubmit={(event) => void handleSubmit(submit)(event)}>
      {accept.error && <ProblemNotice error={accept.error} />}
      {/* Lets the browser store the password under the right name. */}
      <input type="email" autoComplete="username" value={invitation.email} readOnly hidden />
      {!known && <FormField label="Your name" autoComplete="name" autoFocus registration={register('name')} error={formState.errors.name} />}
      <FormField
        label={known ? 'Your password' : 'Choose a password'}
        hint={known ? 'The one that you sign in with already.' : 'At least 12 characters; a few words in a row are good.'}
        type="password"
        autoComplete={known ? 'current-password' : 'new-password'}
        autoFocus={known}
        registration={register('password')}
        error={formState.errors.password}
      />
      <Button type="submit" intent="primary" size="large" fill loading={accept.isPending}>
        {`Join ${invitation.organisationName}`}
      </Button>
    </form>
  );
}

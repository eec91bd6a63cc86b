import { Button, FormGroup, HTMLSelect } from '@blueprintjs/core';
import { role as roleSchema, type CreateInvitationRequest } from '@masswright/contracts';
import { useId } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { FormField } from '../../../components/form-field';
import { Notice } from '../../../components/notice';
import { ProblemNotice } from '../../../components/problem-notice';
import { roleTexts } from '../../../lib/role-texts';
import { createZodResolver } from '../../../lib/zod-resolver';
import { useInvite } from '../api/people';

const resolver = createZodResolver<CreateInvitationRequest>(() => import('@masswright/contracts').then(({ createInvitationRequest }) => createInvitationRequest));

export function InviteForm() {
  const invite = useInvite();
  const roleId = useId();
  const { register, handleSubmit, formState, control, reset } = useForm<CreateInvitationRequest>({
    resolver,
    defaultValues: { email: '', role: 'engineer' },
  });
  const chosen = useWatch({ control, name: 'role' });
  const submit = (values: CreateInvitationRequest): void => invite.mutate(values, { onSuccess: () => reset({ email: '', role: values.role }) });
  return (
    <form noValidate className="invite-form" onSubmit={(event) => void handleSubmit(submit)(event)}>
      <FormField label="E-mail" type="email" autoComplete="off" registration={register('email')} error={formState.errors.email} />
      <FormGroup label="Role" labelFor={roleId} helperText={`As ${roleTexts[chosen].withArticle}: ${roleTexts[chosen].may.replace(/^you/, 'they')}`}>
        <HTMLSelect id={roleId} fill options={roleSchema.options.map((value) => ({ value, label: roleTexts[value].name }))} {...register('role')} />
      </FormGroup>
      <Button type="submit" intent="primary" loading={invite.isPending}>
        Send the invitation
      </Button>
      {invite.error && <ProblemNotice error={invite.error} />}
      {invite.data && !invite.isPending && (
        <Notice tone="agreement" live>
          <p>The invitation is on its way to {invite.data.email}.</p>
        </Notice>
      )}
    </form>
  );
}

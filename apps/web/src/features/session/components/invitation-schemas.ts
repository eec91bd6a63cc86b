import { acceptInvitationRequest } from '@masswright/contracts';
import { z } from 'zod';

const [newPerson, knownPerson] = acceptInvitationRequest.options;

export const newPersonForm = newPerson.pick({ name: true, password: true });
/** The name of a person who has an account is known already, so whatever stands there is not looked at. */
export const knownPersonForm = knownPerson.pick({ password: true }).extend({ name: z.string() });

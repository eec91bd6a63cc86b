import { describe, expect, it } from 'vitest';
import type { ResolverOptions } from 'react-hook-form';
import type { SignInRequest } from '@masswright/contracts';
import { createZodResolver } from './zod-resolver';

const resolver = createZodResolver<SignInRequest>(() => import('@masswright/contracts').then(({ signInRequest }) => signInRequest));
const options: ResolverOptions<SignInRequest> = { fields: {}, shouldUseNativeValidation: false };

describe('forms held to a contract', () => {
  it('give what the contract makes of the values', async () => {
    const { values, errors } = await resolver({ email: ' Ines@Halyard.Example ', password: 'a few words in a row' }, undefined, options);
    expect(values).toEqual({ email: 'ines@halyard.example', password: 'a few words in a row' });
    expect(errors).toEqual({});
  });
  it('say what is wrong at the field that it is wrong in', async () => {
    const { errors } = await resolver({ email: 'ines', password: '' }, undefined, options);
    expect(errors.email?.message).toContain('not an e-mail address');
    expect(errors.password?.message).toContain('Give your password');
  });
});

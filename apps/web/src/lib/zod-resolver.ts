import type { FieldErrors, FieldValues, Resolver } from 'react-hook-form';
import type { z } from 'zod';

/**
 * Holds a form to a contract's schema: the same sentences as the api would give, before anything is sent.
 * The schema is read when a form is first checked, so that no page has to wait for it to be seen.
 */
export function createZodResolver<Values extends FieldValues>(readSchema: () => Promise<z.ZodType<Values>>): Resolver<Values> {
  return async (values) => {
    const parsed = (await readSchema()).safeParse(values);
    if (parsed.success) return { values: parsed.data, errors: {} };
    const errors: Record<string, { type: string; message: string }> = {};
    for (const issue of parsed.error.issues) {
      const field = issue.path.join('.');
      errors[field] ??= { type: issue.code, message: issue.message };
    }
    return { values: {}, errors: errors as FieldErrors<Values> };
  };
}

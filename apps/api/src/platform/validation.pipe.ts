import { Injectable, StandardSchemaValidationPipe, type ArgumentMetadata } from '@nestjs/common';
import { AppError, notFound } from './app-error';

const segmentName = (segment: PropertyKey | { key: PropertyKey }): string => String(typeof segment === 'object' ? segment.key : segment);

/** Holds what comes in against its contract. An id in a path that is none names nothing, so it is not found. */
@Injectable()
export class ContractValidationPipe extends StandardSchemaValidationPipe {
  constructor() {
    super({
      exceptionFactory: (issues) => {
        const fields = issues.map((issue) => ({ path: (issue.path ?? []).map(segmentName).join('.'), message: issue.message }));
        return new AppError('invalid-input', fields.map(({ path, message }) => (path === '' ? message : `${path}: ${message}`)).join(' '), { fields });
      },
    });
  }

  override async transform<T>(value: T, metadata: ArgumentMetadata): Promise<T> {
    try {
      return await super.transform<T>(value, metadata);
    } catch (error) {
      if (metadata.type === 'param' && error instanceof AppError) throw notFound('thing');
      throw error;
    }
  }
}

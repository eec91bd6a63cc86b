import { applyDecorators, Header, HttpCode } from '@nestjs/common';
import { ApiOperation, ApiResponse, type ApiResponseMetadata } from '@nestjs/swagger';
import { problem } from '@masswright/contracts';
import { z } from 'zod';

export interface OperationDescription {
  summary: string;
  status?: 200 | 201 | 202 | 204;
  /** What the answer holds; left out where it is empty. */
  answer?: z.ZodType;
  /** Where the answer is a file: what is in it, by media type. The route sends it itself. */
  file?: Record<string, z.ZodType>;
}

function describeFile(file: NonNullable<OperationDescription['file']>): ApiResponseMetadata {
  const content = Object.entries(file).map(([mediaType, contract]) => {
    const { $schema: _, ...schema } = z.toJSONSchema(contract, { io: 'output', target: 'draft-2020-12' });
    return [mediaType, { schema }];
  });
  return { content: Object.fromEntries(content) as ApiResponseMetadata['content'] };
}

/** Says of a route what the OpenAPI document says of it, and sets the status that it promises. Answers are never cached: they are a person's. */
export function Operation({ summary, status = 200, answer, file }: OperationDescription): MethodDecorator {
  const holds = file === undefined ? (answer === undefined ? {} : { standardSchema: answer }) : describeFile(file);
  return applyDecorators(
    HttpCode(status),
    Header('Cache-Control', 'no-store'),
    ApiOperation({ summary }),
    ApiResponse({ status, description: summary, ...holds }),
    ApiResponse({ status: '4XX', description: 'Refused; `code` says why.', standardSchema: problem }),
    ApiResponse({ status: '5XX', description: 'Failed; worth trying again.', standardSchema: problem }),
  );
}

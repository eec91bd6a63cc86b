import { applyDecorators, Header, HttpCode } from '@nestjs/common';
import { ApiOperation, ApiResponse } from '@nestjs/swagger';
import { problem } from '@masswright/contracts';
import type { z } from 'zod';

export interface OperationDescription {
  summary: string;
  status?: 200 | 201 | 202 | 204;
  /** What the answer holds; left out where it is empty. */
  answer?: z.ZodType;
}

/** Says of a route what the OpenAPI document says of it, and sets the status that it promises. Answers are never cached: they are a person's. */
export function Operation({ summary, status = 200, answer }: OperationDescription): MethodDecorator {
  return applyDecorators(
    HttpCode(status),
    Header('Cache-Control', 'no-store'),
    ApiOperation({ summary }),
    ApiResponse({ status, description: summary, ...(answer === undefined ? {} : { standardSchema: answer }) }),
    ApiResponse({ status: '4XX', description: 'Refused; `code` says why.', standardSchema: problem }),
    ApiResponse({ status: '5XX', description: 'Failed; worth trying again.', standardSchema: problem }),
  );
}

import type { INestApplication } from '@nestjs/common';
import { DocumentBuilder, SwaggerModule, type OpenAPIObject } from '@nestjs/swagger';
import { z } from 'zod';

function toJsonSchema(schema: unknown, options: { schemaType: 'input' | 'output' }): { schema: unknown } | undefined {
  if (!(schema instanceof z.ZodType)) return undefined;
  const { $schema: _, ...json } = z.toJSONSchema(schema, { io: options.schemaType, target: 'draft-2020-12', unrepresentable: 'any' });
  return { schema: json };
}

/** The OpenAPI 3.1 document of the running routes; their contracts are JSON Schema 2020-12, as 3.1 wants. */
export function createOpenApiDocument(application: INestApplication): OpenAPIObject {
  const description = new DocumentBuilder()
    .setOpenAPIVersion('3.1.0')
    .setTitle('Masswright')
    .setDescription('Mass properties of parts from their meshes. SI units throughout, but for a measurement, which is in the unit of its mesh at unit density.')
    .setVersion('1')
    .addCookieAuth('__Host-masswright')
    .build();
  return SwaggerModule.createDocument(application, description, {
    standardSchemaConverter: toJsonSchema,
    operationIdFactory: (controller, method) => `${controller.replace(/Controller$/, '').toLowerCase()}.${method}`,
  });
}

import type { INestApplication } from '@nestjs/common';
import { DocumentBuilder, SwaggerModule, type OpenAPIObject } from '@nestjs/swagger';
import * as contracts from '@masswright/contracts';
import { z } from 'zod';

/** Contracts by themselves, so that one that is an answer as a whole stands in the document once, under its name. */
const names = new Map<unknown, string>(Object.entries(contracts).map(([name, contract]) => [contract, name[0]?.toUpperCase() + name.slice(1)]));

function toJsonSchema(schema: unknown, options: { schemaType: 'input' | 'output' }): { schema: unknown; components?: Record<string, unknown> } | undefined {
  if (!(schema instanceof z.ZodType)) return undefined;
  const { $schema: _, ...json } = z.toJSONSchema(schema, { io: options.schemaType, target: 'draft-2020-12', unrepresentable: 'any' });
  const name = names.get(schema);
  // Query parameters are listed one by one, not as an object.
  if (name === undefined || json.type !== 'object' || name.endsWith('Query')) return { schema: json };
  return { schema: { $ref: `#/components/schemas/${name}` }, components: { [name]: json } };
}

type Responses = Record<string, { content?: Record<string, unknown> }>;

/** Refusals have a media type of their own, which the decorators can't say beside a contract. */
function nameProblemMediaType(document: OpenAPIObject): void {
  for (const operations of Object.values(document.paths)) {
    for (const operation of Object.values(operations as Record<string, { responses?: Responses }>)) {
      for (const [status, response] of Object.entries(operation.responses ?? {})) {
        const json = response.content?.['application/json'] ?? response.content?.['text/event-stream'];
        if (/^[45]/.test(status) && json !== undefined) response.content = { 'application/problem+json': json };
      }
    }
  }
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
  const document = SwaggerModule.createDocument(application, description, {
    standardSchemaConverter: toJsonSchema,
    operationIdFactory: (controller, method) => `${controller.replace(/Controller$/, '').toLowerCase()}.${method}`,
  });
  nameProblemMediaType(document);
  return document;
}

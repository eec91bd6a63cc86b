import { Ajv2020, type ValidateFunction } from 'ajv/dist/2020.js';
import document from '../../libs/client/src/openapi.json';

interface MediaType {
  schema: object;
}
interface Operation {
  operationId: string;
  responses: Record<string, { content?: Record<string, MediaType> }>;
}
type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';
const paths = document.paths as unknown as Record<string, Partial<Record<Method, Operation>>>;

// Formats are not needed: the contracts' own patterns stand beside them.
const ajv = new Ajv2020({ strict: false, allErrors: true, validateFormats: false });
ajv.addSchema({ $id: 'document', ...document });

const patterns = Object.keys(paths).map((path) => ({ path, pattern: new RegExp(`^${path.replace(/\{\w+\}/g, '[^/]+')}$`) }));
const validators = new Map<object, ValidateFunction>();

function validatorOf(schema: object): ValidateFunction {
  const known = validators.get(schema);
  if (known !== undefined) return known;
  const inDocument = JSON.parse(JSON.stringify(schema).replaceAll('"#/components/', '"document#/components/')) as object;
  const made = ajv.compile(inDocument);
  validators.set(schema, made);
  return made;
}

/** Every operation of the document, as `get /api/v1/session`. */
export const documentedOperations = Object.entries(paths).flatMap(([path, operations]) => Object.keys(operations).map((method) => `${method} ${path}`));

/**
 * Holds an answer of the api against the OpenAPI document: the operation is there, the status is foreseen, the body is as described.
 * @throws Error that says what differs
 */
export function checkAgainstDocument(answer: { method: string; path: string; status: number; contentType: string | null; body: unknown }): void {
  const where = `${answer.method} ${answer.path} → ${answer.status}`;
  // A path without parameters goes before one with: `lookup` is not an id.
  const found = patterns.filter(({ pattern }) => pattern.test(answer.path)).sort((a, b) => Number(a.path.includes('{')) - Number(b.path.includes('{')));
  const operation = found.map(({ path }) => paths[path]?.[answer.method.toLowerCase() as Method]).find((one) => one !== undefined);
  if (operation === undefined) {
    if (answer.status === 404) return;
    throw new Error(`${where}: the document has no such operation.`);
  }
  const response = operation.responses[String(answer.status)] ?? operation.responses[`${String(answer.status)[0]}XX`];
  if (response === undefined) throw new Error(`${where}: the document does not foresee this status.`);
  if (response.content === undefined) {
    if (answer.body !== undefined) throw new Error(`${where}: the document foresees no body.`);
    return;
  }
  const mediaType = answer.contentType?.split(';')[0] ?? '';
  const described = response.content[mediaType];
  if (described === undefined) throw new Error(`${where}: the document does not foresee ${mediaType}.`);
  const validate = validatorOf(described.schema);
  if (!validate(answer.body)) throw new Error(`${where}: ${ajv.errorsText(validate.errors)}`);
}

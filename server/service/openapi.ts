import { OpenApiGeneratorV31, OpenAPIRegistry, type ResponseConfig } from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { endpoints } from '../../shared/api.ts';
import type { Endpoint, Method } from '../../shared/endpoint.ts';
import { problemCodes, problemSchema } from '../../shared/errors.ts';

/** The API described from the very schemas it runs on (OpenAPI 3.1). */
export function describeApi(version: string): Record<string, unknown> {
  const registry = new OpenAPIRegistry();
  registry.registerComponent('securitySchemes', 'session', { type: 'apiKey', in: 'cookie', name: 'cinderpath' });
  for (const [name, endpoint] of Object.entries(endpoints)) {
    registry.registerPath({
      method: endpoint.method.toLowerCase() as Lowercase<Method>, // the string type is lost by lowering
      path: endpoint.path.replace(/:(\w+)/g, '{$1}'),
      operationId: name,
      tags: [name.split('.')[0] ?? name],
      summary: endpoint.summary,
      description: endpoint.access === 'anyone' ? 'For anyone.' : `Needs the right \`${endpoint.access}\`.`,
      security: endpoint.access === 'anyone' ? [] : [{ session: [] }],
      request: {
        params: objectOf(endpoint.params),
        query: objectOf(endpoint.query),
        headers: headersOf(endpoint),
        ...(bodyOf(endpoint) ?? {}),
      },
      responses: {
        ...answerOf(endpoint),
        default: {
          description: `A problem (RFC 9457). Codes: ${Object.keys(problemCodes).join(', ')}.`,
          content: { 'application/problem+json': { schema: problemSchema } },
        },
      },
    });
  }
  const document = new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Cinderpath',
      version,
      description: 'Everything is SI (m, s, W, Pa, K); plate thickness is whole micrometres.',
    },
  });
  return { ...document };
}

/** Parameters are described one by one, so alternatives are told as one object whose fields are optional. */
function objectOf(schema: z.ZodType): z.ZodObject {
  if (schema instanceof z.ZodObject) return schema;
  if (schema instanceof z.ZodUnion) {
    const shapes = schema.options.map((option) => (option instanceof z.ZodObject ? option.shape : {}));
    return z.object(Object.assign({}, ...shapes) as z.ZodRawShape).partial(); // Object.assign loses the type
  }
  return z.object({});
}

function headersOf({ ifMatch, idempotencyKey }: Endpoint): z.ZodObject | undefined {
  if (!ifMatch && !idempotencyKey) return undefined;
  return z.object({
    ...(ifMatch ? { 'If-Match': z.string() } : {}),
    ...(idempotencyKey ? { 'Idempotency-Key': z.string().min(1).max(255) } : {}),
  });
}

function bodyOf({ body, file }: Endpoint) {
  if (file) {
    const content = z.string().meta({ contentEncoding: 'binary' });
    const form = z.object({
      [file.field]: file.required ? content : content.optional(),
      ...(body ? { data: body } : {}),
    });
    return { body: { content: { 'multipart/form-data': { schema: form } }, required: true } };
  }
  return body ? { body: { content: { 'application/json': { schema: body } }, required: true } } : null;
}

/** What creates answers 201, all else 200: either way it is this. */
function answerOf({ answer, bytes }: Endpoint): Record<string, ResponseConfig> {
  if (bytes) {
    const schema = z.string().meta({ contentEncoding: 'binary' });
    return { 200: { description: 'The file', content: { 'application/octet-stream': { schema } } } };
  }
  if (!answer) return { 204: { description: 'Done' } };
  return { '2XX': { description: 'The answer', content: { 'application/json': { schema: answer } } } };
}

import { type Endpoint, endpoints, Problem } from '@nightcone/contracts';
import { modelJsonSchema, models } from '@nightcone/models';
import { z } from 'zod';

type Schema = Record<string, unknown>;

const anyJson = '#/components/schemas/Json';
const problem = { $ref: '#/components/schemas/Problem' };

/** The JSON Schema of one part. "Any JSON value" is the only recursive schema of the contract: one component stands for it. */
function schemaOf(part: z.ZodType, io: 'input' | 'output'): Schema {
  const { $schema: _, $defs: _recursive, ...schema } = z.toJSONSchema(part, { io }) as Schema;
  return JSON.parse(JSON.stringify(schema).replace(/"#\/\$defs\/[^"]+"/g, `"${anyJson}"`)) as Schema;
}

function parameters(part: z.ZodType | undefined, place: 'path' | 'query'): Schema[] {
  if (!part) return [];
  const { properties = {}, required = [] } = schemaOf(part, 'input') as {
    properties?: Record<string, Schema>;
    required?: string[];
  };
  return Object.entries(properties).map(([name, schema]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema,
  }));
}

/** Answers without a schema: streams and raw bytes. */
const bytes: Record<string, string> = {
  streamEvents: 'text/event-stream',
  getKernelModule: 'application/wasm',
};

function responses(endpoint: Endpoint): Schema {
  const status = String(endpoint.status ?? 200);
  const content = endpoint.response
    ? { 'application/json': { schema: schemaOf(endpoint.response, 'output') } }
    : endpoint.status === 204
      ? undefined
      : { [bytes[endpoint.id] ?? 'application/octet-stream']: {} };
  return {
    [status]: { description: endpoint.status === 204 ? 'Done' : 'The answer', ...(content ? { content } : {}) },
    default: { description: 'Refused', content: { 'application/problem+json': { schema: problem } } },
  };
}

function accessText({ access, scope }: Endpoint): string {
  if (access === 'anyone') return 'Open to anyone.';
  const who = access === 'signed-in' ? 'anybody signed in' : `accounts with the role ${access.join(' or ')}`;
  return `For ${who}; a token needs the scope \`${scope}\`.`;
}

function operation(endpoint: Endpoint): Schema {
  const { id, summary, access, scope, params, query, body, method } = endpoint;
  const header = { name: 'Idempotency-Key', in: 'header', required: false, schema: { type: 'string', minLength: 8 } };
  return {
    operationId: id,
    summary,
    description: accessText(endpoint),
    security: access === 'anyone' ? [] : [{ session: [] }, { token: [scope] }],
    parameters: [...parameters(params, 'path'), ...parameters(query, 'query'), ...(method === 'post' ? [header] : [])],
    ...(body
      ? { requestBody: { required: true, content: { 'application/json': { schema: schemaOf(body, 'input') } } } }
      : {}),
    responses: responses(endpoint),
  };
}

/** What each model takes, by its own definition. */
function modelSchemas(): Record<string, Schema> {
  const named = models.map((model) => {
    const { $schema: _, ...schema } = modelJsonSchema(model) as Schema;
    return [`specification-${model.id}`, schema] as const;
  });
  return Object.fromEntries(named);
}

/** OpenAPI 3.1 of everything below /api/v1, made from the contract. */
export function openApiDocument(version: string): Schema {
  const paths: Record<string, Record<string, Schema>> = {};
  for (const endpoint of Object.values(endpoints) as Endpoint[]) {
    const path = endpoint.path.replace(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [endpoint.method]: operation(endpoint) };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Nightcone',
      version,
      description: 'Overnight queue for continuum Dirac computations that reproduce by their hash.',
    },
    servers: [{ url: '/api/v1' }],
    paths,
    components: {
      schemas: { Json: { description: 'Any JSON value.' }, Problem: schemaOf(Problem, 'output'), ...modelSchemas() },
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: 'nightcone.sid' },
        token: { type: 'http', scheme: 'bearer', description: 'A personal access token.' },
      },
    },
  };
}

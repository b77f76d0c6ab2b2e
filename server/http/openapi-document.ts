import { z } from 'zod';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { fileContentSchema } from '#shared/contracts/files.contract.ts';
import { isProblemCode, problems, problemSchema } from '#shared/contracts/problems.ts';
import type { ProblemCode } from '#shared/contracts/problems.ts';

const problemCodes = Object.keys(problems).filter(isProblemCode);
const everywhere: readonly ProblemCode[] = ['rate.exceeded', 'service.unavailable', 'internal'];

/** The OpenAPI 3.1 description of the contracts; schemas are JSON Schema 2020-12 as OpenAPI 3.1 takes them. */
export function openApiDocument(contracts: readonly Contract[]) {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const contract of contracts) {
    const path = contract.path.replaceAll(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [contract.method.toLowerCase()]: operation(contract) };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Millpond',
      version: '1',
      description:
        'Sign in with a browser at /auth/sign-in; calls carry the session cookie. Changes carry X-Millpond-Csrf.',
    },
    paths,
    components: {
      schemas: { Problem: jsonSchema(problemSchema, 'output') },
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: 'millpond_session' },
      },
    },
  };
}

function operation(contract: Contract) {
  const isPublic = contract.access.kind === 'public';
  const body = requestBody(contract);
  return {
    operationId: contract.name,
    summary: contract.summary,
    security: isPublic ? [] : [{ session: [] }],
    parameters: [
      ...parametersOf(contract.params, 'path'),
      ...parametersOf(contract.query, 'query'),
      ...headersOf(contract),
    ],
    ...(body === undefined ? {} : { requestBody: body }),
    responses: { [contract.status]: success(contract), ...problemResponses(contract) },
    ...(contract.access.kind === 'action' ? { 'x-millpond-action': contract.access.action } : {}),
  };
}

function parametersOf(schema: z.ZodType, place: 'path' | 'query') {
  if (!(schema instanceof z.ZodObject)) {
    return [];
  }
  const shape: Readonly<Record<string, z.core.$ZodType>> = schema.shape;
  return Object.entries(shape).map(([name, field]) => ({
    name,
    in: place,
    required: place === 'path' || !field._zod.optin,
    schema: jsonSchema(field, 'input'),
  }));
}

function headersOf(contract: Contract) {
  const text = { type: 'string' };
  const isChange = contract.method !== 'GET' && contract.access.kind !== 'public';
  return [
    ...(isChange ? [{ name: 'X-Millpond-Csrf', in: 'header', required: true, schema: text }] : []),
    ...(contract.idempotent
      ? [
          {
            name: 'Idempotency-Key',
            in: 'header',
            required: true,
            schema: { ...text, format: 'uuid' },
          },
        ]
      : []),
  ];
}

function requestBody(contract: Contract) {
  if (contract.body instanceof z.ZodUndefined) {
    return undefined;
  }
  const isFile = contract.body instanceof z.ZodCustom;
  const content = isFile
    ? { 'application/octet-stream': { schema: {} } }
    : { 'application/json': { schema: jsonSchema(contract.body, 'input') } };
  return { required: true, content };
}

function success(contract: Contract) {
  const description = 'Done';
  if (contract.status === 204) {
    return { description };
  }
  return contract.response === fileContentSchema
    ? { description, content: { '*/*': { schema: {} } } }
    : {
        description,
        content: { 'application/json': { schema: jsonSchema(contract.response, 'output') } },
      };
}

function problemResponses(contract: Contract) {
  const codes = [...contract.problems, ...commonProblems(contract), ...everywhere];
  const statuses = new Set(codes.map((code) => problems[code].status));
  return Object.fromEntries(
    [...statuses].map((status) => [
      status,
      {
        description: problemCodes
          .filter((code) => codes.includes(code) && problems[code].status === status)
          .map((code) => `${code}: ${problems[code].title}`)
          .join('; '),
        content: {
          'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } },
        },
      },
    ]),
  );
}

function commonProblems(contract: Contract): ProblemCode[] {
  if (contract.access.kind === 'public') {
    return ['input.invalid'];
  }
  return [
    'session.missing',
    'not-found',
    'input.invalid',
    ...(contract.access.kind === 'action' ? (['access.refused'] as const) : []),
    ...(contract.method === 'GET' ? [] : (['session.csrf', 'input.malformed'] as const)),
    ...(contract.idempotent ? (['idempotency.missing', 'idempotency.reused'] as const) : []),
  ];
}

/** `$schema` is left out: OpenAPI 3.1 names the dialect once for the whole document. */
function jsonSchema(schema: z.core.$ZodType, io: 'input' | 'output') {
  const document = z.toJSONSchema(schema, {
    io,
    target: 'draft-2020-12',
    unrepresentable: 'any',
  });
  return Object.fromEntries(Object.entries(document).filter(([name]) => name !== '$schema'));
}

import { operationsOf, sections } from './index.ts';
import type { Operation, Who } from './operation.ts';
import { SchemaShelf } from './schema-shelf.ts';

export interface OpenApiParameter {
  name: string;
  in: 'path' | 'query' | 'header';
  required: boolean;
  schema: object;
  description?: string;
}

interface Body {
  required?: boolean;
  description?: string;
  content?: Record<string, { schema: object }>;
}

export interface OpenApiOperation {
  operationId: string;
  summary: string;
  tags: string[];
  /** Who may call; the sessions below say with which cookie. */
  'x-who': Who;
  security: Record<string, string[]>[];
  parameters: OpenApiParameter[];
  requestBody?: Body;
  responses: Record<string, Body & { $ref?: string }>;
}

export interface OpenApiDocument {
  openapi: '3.1.1';
  info: { title: string; version: string; description: string };
  servers: { url: string }[];
  tags: { name: string }[];
  paths: Record<string, Record<string, OpenApiOperation>>;
  components: { schemas: Record<string, object>; responses: Record<string, Body>; securitySchemes: Record<string, object> };
}

const STUDIO = 'studioSession';
const GUEST = 'guestSession';
/** Begun by an open link, for one sheet: the name of its cookie ends with the sheet's id. */
const LOOKER = 'lookerSession';

const SESSIONS: Record<Who, string[]> = {
  anyone: [],
  staff: [STUDIO],
  owner: [STUDIO],
  guest: [GUEST],
  looker: [GUEST, LOOKER],
  'guest-of-sheet': [GUEST],
  lead: [GUEST],
  recipient: [GUEST],
};

/** "get /api/sheets/{sheetId}/pick-lists" is called getSheetsBySheetIdPickLists. */
function operationId({ method, path }: Operation): string {
  const words = path.replace('/api/', '/').replace(/\{(\w+)\}/g, 'by-$1');
  return method + words.replace(/[/.-]+(\w)/g, (_all, letter: string) => letter.toUpperCase());
}

function pathParameters({ path }: Operation): OpenApiParameter[] {
  return [...path.matchAll(/\{(\w+)\}/g)].map(([, name = '']) => ({
    name,
    in: 'path',
    required: true,
    schema: /Id$/.test(name) ? { type: 'string', format: 'uuid' } : { type: 'string' },
  }));
}

function queryParameters(shelf: SchemaShelf, { query }: Operation): OpenApiParameter[] {
  if (!query) return [];
  const { properties = {}, required = [] } = shelf.inline(query) as { properties?: Record<string, object>; required?: string[] };
  return Object.entries(properties).map(([name, schema]) => ({ name, in: 'query', required: required.includes(name), schema }));
}

function ifMatch(operation: Operation): OpenApiParameter[] {
  const description = 'The version of the row as it was read, in quotation marks: "7".';
  return operation.ifMatch ? [{ name: 'If-Match', in: 'header', required: true, schema: { type: 'string' }, description }] : [];
}

function requestBody(shelf: SchemaShelf, id: string, { body, file }: Operation): { requestBody?: Body } {
  if (file) {
    const properties = { [file]: { type: 'string', format: 'binary' } };
    return {
      requestBody: { required: true, content: { 'multipart/form-data': { schema: { type: 'object', properties, required: [file] } } } },
    };
  }
  return body ? { requestBody: { required: true, content: { 'application/json': { schema: shelf.body(body, `${id}Body`) } } } } : {};
}

/** What the kind of a request can be refused with, beside what its own rules say. */
function refusals({ who, path, body, query, ifMatch: version }: Operation): string[] {
  return [
    ...(who === 'anyone' ? [] : ['401']),
    ...(who === 'owner' || who === 'lead' ? ['403'] : []),
    ...(path.includes('{') ? ['404'] : []),
    ...(version ? ['412', '428'] : []),
    ...(body || query ? ['422'] : []),
    'default',
  ];
}

function responses(shelf: SchemaShelf, id: string, operation: Operation): OpenApiOperation['responses'] {
  const { answer, status = 200 } = operation;
  const media = typeof answer === 'string' ? answer : 'application/json';
  const schema = typeof answer === 'string' ? { type: 'string' } : answer && shelf.answer(answer, `${id}Answer`);
  return {
    [status]: { description: operation.summary, ...(schema ? { content: { [media]: { schema } } } : {}) },
    ...Object.fromEntries(refusals(operation).map((refusal) => [refusal, { $ref: '#/components/responses/Problem' } as Body])),
  };
}

function describe(shelf: SchemaShelf, tag: string, operation: Operation): OpenApiOperation {
  const id = operationId(operation);
  return {
    operationId: id,
    summary: operation.summary,
    tags: [tag],
    'x-who': operation.who,
    security: SESSIONS[operation.who].map((session) => ({ [session]: [] })),
    parameters: [...pathParameters(operation), ...queryParameters(shelf, operation), ...ifMatch(operation)],
    ...requestBody(shelf, id, operation),
    responses: responses(shelf, id, operation),
  };
}

function cookie(name: string): object {
  return { type: 'apiKey', in: 'cookie', name };
}

/** The API as OpenAPI 3.1.1, made from the contract alone. `server` is the address it is found at. */
export function openApiDocument(server: string): OpenApiDocument {
  const shelf = new SchemaShelf(sections);
  const paths: OpenApiDocument['paths'] = {};
  for (const section of sections) {
    for (const operation of operationsOf(section)) {
      (paths[operation.path] ??= {})[operation.method] = describe(shelf, section.name, operation);
    }
  }
  const problem = shelf.named('ProblemDocument');
  return {
    openapi: '3.1.1',
    info: { title: 'Oriel', version: '1', description: 'Proofing and delivery of pictures of cities and buildings.' },
    servers: [{ url: server }],
    tags: sections.map(({ name }) => ({ name })),
    paths,
    components: {
      schemas: shelf.schemas(),
      responses: {
        Problem: {
          description: 'What was wrong (RFC 9457)',
          content: { 'application/problem+json': { schema: problem } },
        },
      },
      securitySchemes: { [STUDIO]: cookie('oriel_studio'), [GUEST]: cookie('oriel_guest'), [LOOKER]: cookie('oriel_look_<sheet>') },
    },
  };
}

/** Every operation of the contract. */
export function everyOperation(): Operation[] {
  return sections.flatMap(operationsOf);
}

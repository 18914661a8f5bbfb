import { Router } from 'express';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { OpenApiDocument } from '../../api/contract/openapi.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let document: OpenApiDocument;

beforeAll(async () => {
  house = await startHouse();
  document = (
    await house.request
      .get('/api/openapi.json')
      .expect(200)
      .expect('Content-Type', /application\/json/)
  ).body;
});
afterAll(() => house.stop());

/** A layer of Express 5's router: a route, or a router mounted below a path. */
interface Layer {
  route?: { path: string; methods: Record<string, boolean> };
  handle: { stack?: Layer[] };
  rawPath: string;
}

function routesBelow(stack: Layer[], prefix = ''): string[] {
  return stack.flatMap((layer) => {
    if (layer.route) {
      const path = prefix + layer.route.path.replace(/\{?[*:](\w+)\}?/g, '{$1}');
      return Object.keys(layer.route.methods).map((method) => `${method} ${path}`);
    }
    expect(layer.rawPath).toEqual(expect.any(String));
    return layer.handle.stack ? routesBelow(layer.handle.stack, prefix + layer.rawPath.replace(/\/$/, '')) : [];
  });
}

function routesOfApi(): string[] {
  const { stack } = house.app.router as unknown as { stack: Layer[] };
  return routesBelow(stack).filter((route) => / \/api(\/|$)/.test(route));
}

function everyOperation() {
  return Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({ path, method, operation })),
  );
}

describe('the description of the API', () => {
  it('names every route below /api, and no other', () => {
    const described = everyOperation().flatMap(({ path, method }) => (path.startsWith('/api/') ? [`${method} ${path}`] : []));
    expect(described.sort()).toEqual([...new Set(routesOfApi())].sort());
  });

  it('walks routers that are mounted within routers', () => {
    const [outer, middle, inner] = [Router(), Router(), Router()];
    inner.get('/things/:thingId', (_req, res) => void res.end());
    middle.use('/middle', inner);
    outer.use(middle);
    expect(routesBelow(outer.stack as unknown as Layer[], '/api')).toEqual(['get /api/middle/things/{thingId}']);
  });

  // OpenAPI 3.1.1, 4.8.10: an operationId is unique among all operations.
  it('gives every operation an id of its own', () => {
    const ids = everyOperation().map(({ operation }) => operation.operationId);
    expect(new Set(ids).size).toBe(ids.length);
    expect(ids.every((id) => /^[a-z][A-Za-z0-9]*$/.test(id))).toBe(true);
  });

  // OpenAPI 3.1.1, 4.8.8.2 and 4.8.12.1: each template expression has its parameter, which is required, and no path occurs twice but for its names.
  it('declares every parameter of a path', () => {
    for (const { path, operation } of everyOperation()) {
      const inPath = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      const declared = operation.parameters.filter((parameter) => parameter.in === 'path');
      expect(declared.map((parameter) => parameter.name)).toEqual(inPath);
      expect(declared.every((parameter) => parameter.required)).toBe(true);
      const names = operation.parameters.map((parameter) => `${parameter.in} ${parameter.name}`);
      expect(new Set(names).size).toBe(names.length);
    }
    const shapes = Object.keys(document.paths).map((path) => path.replace(/\{\w+\}/g, '{}'));
    expect(new Set(shapes).size).toBe(shapes.length);
  });

  // OpenAPI 3.1.1, 4.8.16: at least one response, each with a description; 4.8.7: names of components; 4.8.2: the version.
  it('has a version, responses with descriptions, component names and references that lead somewhere', () => {
    expect(document.openapi).toBe('3.1.1');
    expect(document.info).toMatchObject({ title: 'Oriel', version: expect.any(String) });
    const known = new Set([
      ...Object.keys(document.components.schemas).map((name) => `#/components/schemas/${name}`),
      ...Object.keys(document.components.responses).map((name) => `#/components/responses/${name}`),
    ]);
    expect([...known].every((reference) => /^#\/components\/\w+\/[\w.-]+$/.test(reference))).toBe(true);
    const references = [...JSON.stringify(document).matchAll(/"\$ref":"([^"]+)"/g)].map(([, reference]) => reference ?? '');
    expect(references.filter((reference) => !known.has(reference))).toEqual([]);
    for (const { operation } of everyOperation()) {
      const responses = Object.entries(operation.responses);
      expect(responses.some(([status]) => /^2\d\d$/.test(status))).toBe(true);
      expect(responses.every(([, response]) => response.$ref ?? response.description)).toBeTruthy();
    }
  });

  it('secures what is not for anyone, with a session that is declared', () => {
    for (const { operation } of everyOperation()) {
      const sessions = operation.security.flatMap((each) => Object.keys(each));
      expect(sessions.length === 0).toBe(operation['x-who'] === 'anyone');
      for (const session of sessions) expect(document.components.securitySchemes).toHaveProperty(session);
    }
  });

  it('says what is answered under a name, and tells what is sent apart where it differs', () => {
    const { schemas } = document.components;
    expect(schemas).toMatchObject({
      ProblemDocument: { required: ['type', 'title', 'status', 'detail'] },
      CommissionDetail: { properties: { client: { type: 'object' }, createdAt: { type: 'string', format: 'date-time' } } },
      AddCommission: { required: ['title'] },
    });
    expect(JSON.stringify(schemas)).not.toMatch(/__shared|\$defs|"\$schema"/);
  });
});

describe('the page that shows it', () => {
  it('names every operation and schema, runs no script and fetches nothing from elsewhere', async () => {
    const { text } = await house.request
      .get('/api/docs')
      .expect(200)
      .expect('Content-Type', /text\/html/);
    for (const { path, operation } of everyOperation()) {
      expect(text).toContain(path);
      expect(text).toContain(`id="${operation.operationId}"`);
    }
    for (const [, target] of text.matchAll(/href="#([^"]+)"/g)) expect(text, `#${target}`).toContain(`id="${target}"`);
    expect(text).not.toMatch(/<script|https?:\/\/|src=/);
  });
});

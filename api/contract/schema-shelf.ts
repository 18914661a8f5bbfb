import { z, type ZodType } from 'zod';
import type { Section } from './index.ts';

type Json = Record<string, unknown>;
type Direction = 'input' | 'output';

const PREFIX = '#/components/schemas/';

/**
 * The schemas of an OpenAPI document. A schema that the contract exports is named by its export; one that stands within an operation is named after
 * that. Where what may be sent differs from what is answered (a field with a default may be left out), what is sent is called …Input.
 */
export class SchemaShelf {
  readonly #names = new Map<ZodType, string>();
  readonly #taken = new Set<string>();
  readonly #wanted: Record<Direction, Map<string, ZodType>> = { input: new Map(), output: new Map() };

  constructor(sections: readonly Section[]) {
    for (const { name: section, module } of sections) {
      for (const [name, value] of Object.entries(module)) {
        if (value instanceof z.ZodType && !this.#names.has(value)) this.#name(value, this.#taken.has(name) ? `${section}${name}` : name);
      }
    }
  }

  /** A reference to what is answered. */
  answer(schema: ZodType, otherwise: string): Json {
    return this.#want('output', schema, otherwise);
  }

  /** A reference to what may be sent. */
  body(schema: ZodType, otherwise: string): Json {
    return this.#want('input', schema, otherwise);
  }

  /** A reference to what is answered under a name of the contract. */
  named(name: string): Json {
    const found = [...this.#names].find(([, each]) => each === name);
    if (!found) throw new Error(`The contract has no schema ${name}.`);
    return this.#want('output', found[0], name);
  }

  /** What may be sent, without a name: for query parameters. */
  inline(schema: ZodType): Json {
    return tidy(z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }) as Json) as Json;
  }

  /** Every schema that something refers to, by name. */
  schemas(): Record<string, object> {
    const answers = this.#reachable('output');
    const bodies = this.#reachable('input');
    const differs = new Set(Object.keys(bodies).filter((name) => answers[name] && !same(answers[name], bodies[name])));
    // What holds a schema that differs differs itself, since it refers to the other name.
    for (let size = -1; size !== differs.size;) {
      size = differs.size;
      for (const [name, schema] of Object.entries(bodies))
        if (answers[name] && references(schema).some((each) => differs.has(each))) differs.add(name);
    }
    this.#renamed = differs;
    const sent = Object.entries(bodies).map(([name, schema]) => [this.#sentName(name), rename(schema, (each) => this.#sentName(each))]);
    return { ...answers, ...(Object.fromEntries(sent) as Record<string, object>) };
  }

  #renamed = new Set<string>();
  #sentName(name: string): string {
    return this.#renamed.has(name) ? `${name}Input` : name;
  }

  #name(schema: ZodType, name: string): void {
    const plain = name.replace(/\W/g, '');
    this.#names.set(schema, plain);
    this.#taken.add(plain);
  }

  #want(direction: Direction, schema: ZodType, otherwise: string): Json {
    if (!this.#names.has(schema)) this.#name(schema, `${otherwise.charAt(0).toUpperCase()}${otherwise.slice(1)}`);
    const name = this.#names.get(schema) ?? otherwise;
    this.#wanted[direction].set(name, schema);
    // Read when the document is written: only then it is known which names differ.
    const nameOf = () => PREFIX + (direction === 'input' ? this.#sentName(name) : name);
    return Object.defineProperty({}, '$ref', { enumerable: true, get: nameOf }) as Json;
  }

  #reachable(direction: Direction): Record<string, Json> {
    const registry = z.registry<{ id: string }>();
    for (const [schema, id] of this.#names) registry.add(schema, { id });
    const { schemas } = z.toJSONSchema(registry, { io: direction, unrepresentable: 'any', uri: (id) => PREFIX + id });
    const reached: Record<string, Json> = {};
    const visit = (name: string) => {
      if (reached[name]) return;
      const schema = tidy(schemas[name] as Json) as Json;
      reached[name] = schema;
      references(schema).forEach(visit);
    };
    for (const name of this.#wanted[direction].keys()) visit(name);
    return reached;
  }
}

const same = (one: unknown, other: unknown) => JSON.stringify(one) === JSON.stringify(other);

/** Leaves out what says nothing to a reader: patterns beside a format, the limits of a double, the dialect of each part. */
function tidy(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(tidy);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value as Json).filter(
    ([key, each]) =>
      !['$schema', '$id'].includes(key) &&
      !(key === 'pattern' && 'format' in value) &&
      !(key === 'additionalProperties' && each === false) &&
      !((key === 'minimum' || key === 'maximum') && Math.abs(Number(each)) === Number.MAX_SAFE_INTEGER),
  );
  return Object.fromEntries(entries.map(([key, each]) => [key, tidy(each)]));
}

function rename(value: unknown, nameOf: (name: string) => string): unknown {
  if (Array.isArray(value)) return value.map((each) => rename(each, nameOf));
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value as Json).map(([key, each]) =>
      key === '$ref' && typeof each === 'string' ? [key, PREFIX + nameOf(each.slice(PREFIX.length))] : [key, rename(each, nameOf)],
    ),
  );
}

function references(value: unknown): string[] {
  if (Array.isArray(value)) return value.flatMap(references);
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value as Json).flatMap(([key, each]) =>
    key === '$ref' && typeof each === 'string' ? [each.slice(PREFIX.length)] : references(each),
  );
}

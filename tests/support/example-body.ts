import { z, type ZodType } from 'zod';

interface Schema {
  type?: string;
  format?: string;
  pattern?: string;
  enum?: unknown[];
  const?: unknown;
  anyOf?: Schema[];
  oneOf?: Schema[];
  allOf?: Schema[];
  items?: Schema;
  properties?: Record<string, Schema>;
  required?: string[];
  minItems?: number;
  minLength?: number;
  minimum?: number;
}

/**
 * The least body that a contract takes. Ids in it are `ids` by the name of their field, so that it is about rows that are there.
 * @throws Error where the example is not what the schema wants: then this file has to learn one more kind of field
 */
export function exampleBody(schema: ZodType, ids: Record<string, string>): unknown {
  const json = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }) as Schema;
  // Where everything may be left out but not all at once, the whole is an example.
  const examples = [false, true].map((whole) => exampleOf(json, '', { ids, whole }));
  const taken = examples.find((example) => schema.safeParse(example).success);
  if (taken === undefined) {
    throw new Error(`No example of a body: ${schema.safeParse(examples[0]).error?.message} for ${JSON.stringify(examples[0])}`);
  }
  return taken;
}

interface Tools {
  ids: Record<string, string>;
  /** With what may be left out. */
  whole: boolean;
}

function exampleOf(schema: Schema, name: string, tools: Tools): unknown {
  const choice = schema.anyOf?.[0] ?? schema.oneOf?.[0] ?? schema.allOf?.[0];
  if (choice) return exampleOf(choice, name, tools);
  if (schema.const !== undefined) return schema.const;
  if (schema.enum) return schema.enum[0];
  if (schema.type === 'object') {
    const wanted = Object.entries(schema.properties ?? {}).filter(([key]) => tools.whole || schema.required?.includes(key));
    return Object.fromEntries(wanted.map(([key, each]) => [key, exampleOf(each, key, tools)]));
  }
  if (schema.type === 'array') return Array.from({ length: schema.minItems ?? 0 }, () => exampleOf(schema.items ?? {}, name, tools));
  if (schema.type === 'integer' || schema.type === 'number') return Math.max(1, schema.minimum ?? 1);
  if (schema.type === 'boolean') return true;
  return exampleText(schema, name, tools.ids);
}

function exampleText({ format, pattern, minLength }: Schema, name: string, ids: Record<string, string>): string {
  if (format === 'uuid') return ids[name.replace(/Ids$/, 'Id')] ?? crypto.randomUUID();
  if (format === 'email' || /email/i.test(name)) return 'somebody@example.test';
  if (format === 'date' || /By$|On$/.test(name)) return '2027-01-10';
  if (pattern?.includes('64')) return 'ab'.repeat(32);
  return 'Some words of an example'.padEnd(minLength ?? 0, ' and more');
}

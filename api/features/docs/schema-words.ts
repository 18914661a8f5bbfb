interface Schema {
  $ref?: string;
  type?: string | string[];
  format?: string;
  enum?: unknown[];
  const?: unknown;
  anyOf?: Schema[];
  oneOf?: Schema[];
  allOf?: Schema[];
  items?: Schema;
  properties?: Record<string, Schema>;
  required?: string[];
  additionalProperties?: Schema | boolean;
  minimum?: number;
  maximum?: number;
  minLength?: number;
  maxLength?: number;
  default?: unknown;
}

/** A JSON schema in words, as HTML. Everything in it comes from the contract, so no text needs to be escaped but signs in constants. */
export function schemaWords(schema: object, unfolded = false): string {
  return words(schema as Schema, unfolded);
}

function words(schema: Schema, unfolded: boolean): string {
  if (schema.$ref) {
    const name = schema.$ref.split('/').at(-1) ?? '';
    return `<a href="#schema-${name}">${name}</a>`;
  }
  const choices = schema.anyOf ?? schema.oneOf ?? schema.allOf;
  if (choices) return choices.map((each) => words(each, false)).join(schema.allOf ? ' and ' : ' or ');
  if (schema.enum) return schema.enum.map(constant).join(', ');
  if (schema.const !== undefined) return constant(schema.const);
  if (schema.items) return `list of ${words(schema.items, false)}`;
  if (schema.properties) return fields(schema, unfolded);
  if (typeof schema.additionalProperties === 'object') return `object of ${words(schema.additionalProperties, false)}`;
  return [schema.format ?? [schema.type ?? 'anything'].flat().join(' or '), limits(schema)].filter(Boolean).join(' ');
}

function fields({ properties = {}, required = [] }: Schema, unfolded: boolean): string {
  const rows = Object.entries(properties).map(([name, schema]) => {
    const may = required.includes(name) ? '' : ' (may be left out)';
    return `<li><code>${name}</code>${may}: ${words(schema, unfolded)}</li>`;
  });
  return `<ul class="fields">${rows.join('')}</ul>`;
}

function limits({ minimum, maximum, minLength, maxLength, default: usual }: Schema): string {
  const bounds = [
    minimum !== undefined && `from ${minimum}`,
    maximum !== undefined && `to ${maximum}`,
    minLength !== undefined && `of at least ${minLength} characters`,
    maxLength !== undefined && `of at most ${maxLength} characters`,
    usual !== undefined && `(${constant(usual)} where nothing is said)`,
  ];
  return bounds.filter(Boolean).join(' ');
}

function constant(value: unknown): string {
  return `<code>${JSON.stringify(value)?.replace(/[&<>]/g, (sign) => `&#${sign.charCodeAt(0)};`) ?? ''}</code>`;
}

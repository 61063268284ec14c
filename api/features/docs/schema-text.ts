/** JSON Schema in a few words, for the readable page. */
export interface JsonSchema {
  type?: string | string[];
  format?: string;
  enum?: unknown[];
  const?: unknown;
  items?: JsonSchema;
  properties?: Record<string, JsonSchema>;
  required?: string[];
  anyOf?: JsonSchema[];
  oneOf?: JsonSchema[];
  allOf?: JsonSchema[];
}

export interface FieldText {
  name: string;
  type: string;
  required: boolean;
}

/** The fields of an object, with those of rows in a list named `rows[].name`. */
export function fieldsOf(schema: JsonSchema | undefined, prefix = ''): FieldText[] {
  return Object.entries(schema?.properties ?? {}).flatMap(([name, field]) => {
    const required = schema?.required?.includes(name) ?? false;
    const path = `${prefix}${name}`;
    const inner = field.items?.properties ? field.items : field;
    const nested = inner.properties
      ? fieldsOf(inner, `${path}${inner === field ? '' : '[]'}.`)
      : [];
    return nested.length > 0 ? nested : [{ name: path, type: typeText(field), required }];
  });
}

export function typeText(schema: JsonSchema | undefined): string {
  if (!schema) return 'anything';
  if (schema.enum) return schema.enum.map((value) => JSON.stringify(value)).join(' or ');
  if (schema.const !== undefined) return JSON.stringify(schema.const);
  const choices = schema.anyOf ?? schema.oneOf;
  if (choices) return choices.map(typeText).join(' or ');
  if (schema.allOf) return schema.allOf.map(typeText).join(' and ');
  if (schema.items) return `list of ${typeText(schema.items)}`;
  const types = [schema.type ?? 'anything'].flat().join(' or ');
  return schema.format ? `${types} (${schema.format})` : types;
}

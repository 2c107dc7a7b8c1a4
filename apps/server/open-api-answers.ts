/** What the routes' own declarations cannot say, merged into the API's description by method and path. */
export type Part = { parameters?: object[]; requestBody?: object; responses?: Record<string, object> };

export const text = { type: 'string' };
export const whole = { type: 'integer' };
export const moment = { type: 'string', format: 'date-time' };
export const open = { type: 'object', additionalProperties: true };
const bytes = { type: 'string', format: 'binary' };

export const listOf = (items: object) => ({ type: 'array', items });
export const nullable = (schema: object) => ({ ...schema, nullable: true });
export const schemaOf = (name: string) => ({ $ref: `#/components/schemas/${name}` });
export const objectOf = (properties: Record<string, object>) => ({
  type: 'object',
  required: Object.keys(properties),
  properties,
});

/** An answer in JSON. */
export const json = (description: string, schema: object) => ({
  description,
  content: { 'application/json': { schema } },
});

/** An answer that is a file, in one of several forms. */
export const file = (description: string, ...types: string[]) => ({
  description,
  content: Object.fromEntries(types.map((type) => [type, { schema: bytes }])),
});

/** A body that is a file. */
export const fileBody = (...types: string[]) => ({
  required: true,
  content: Object.fromEntries(types.map((type) => [type, { schema: bytes }])),
});

export const query = (name: string, description: string, schema: object, required = false) => ({
  ...{ in: 'query', name, description, required, schema },
});

export const header = (name: string, description: string, required: boolean) => ({
  ...{ in: 'header', name, description, required, schema: text },
});

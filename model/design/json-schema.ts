/**
 * A description (`kinds.ts`) as JSON Schema, draft 2020-12. Every field has its unit in `x-unit` ("1" for a plain number, "none" for what is no
 * quantity) and in the description, with its range and its default.
 */
import { defaultOf, type Field, type FieldInfo, type Group, keyField, memberDefaults, type Union } from './kinds.ts';
import { expectedOf, plainly } from './wording.ts';

/** Each group but the root becomes an entry of `$defs`, by its title. */
export function toJsonSchema(root: Group): Record<string, unknown> {
  const defs: Record<string, object> = {};
  const body = groupSchema(root, {}, defs);
  return { ...body, $defs: defs };
}

type Defs = Record<string, object>;

const NO_QUANTITY = { 'x-unit': 'none' };

/** What it is, what it may hold, and `rest`. */
function described(field: Field, rest: string): string {
  const expected = expectedOf(field);
  return `${field.description} ${expected[0].toUpperCase()}${expected.slice(1)}; ${rest}.`;
}

/** `optional`: what may be left out, so that no default stands for it. */
function fieldSchema(field: Field, defs: Defs, optional = false): object {
  switch (field.kind) {
    case 'group':
      return {
        ...reference(field, {}, defs),
        description: described(field, 'default each value at its own'),
        ...NO_QUANTITY,
        default: defaultOf(field),
      };
    case 'union':
      return {
        title: field.title,
        description: described(field, `default ${field.default}`),
        ...NO_QUANTITY,
        oneOf: Object.entries(field.members).map(([key, member]) => reference(member, keySchema(field, key), defs)),
        default: memberDefaults(field, field.default),
      };
    case 'list':
      return {
        type: 'array',
        description: described(field, optional ? 'default none' : `default ${field.min} with every value at its own`),
        ...NO_QUANTITY,
        items: reference(field.item, {}, defs),
        minItems: field.min,
        maxItems: field.max,
        ...(!optional && { default: defaultOf(field) }),
      };
    default:
      return leafSchema(field);
  }
}

function leafSchema(field: FieldInfo): object {
  const usual = field.kind === 'number' && typeof field.default === 'number' ? plainly(field.default, field.unit) : String(field.default);
  const type = field.whole ? 'integer' : 'number';
  const notes = {
    description: described(field, `default ${usual}`),
    'x-unit': field.kind === 'number' ? field.unit || '1' : 'none',
    default: field.default,
  };
  switch (field.kind) {
    case 'number':
      return {
        type: field.nullable ? [type, 'null'] : type,
        minimum: field.min,
        maximum: field.max,
        ...notes,
      };
    case 'text':
      return { type: 'string', minLength: field.min, maxLength: field.max, ...notes };
    case 'flag':
      return { type: 'boolean', ...notes };
    case 'choice':
      return { enum: field.choices, ...notes };
  }
}

function keySchema(union: Union, key: string): Record<string, object> {
  const field = keyField(union);
  return {
    [union.key]: { const: key, description: described(field, `here ${key}; default ${union.default}`), ...NO_QUANTITY, default: key },
  };
}

function reference(group: Group, extra: Record<string, object>, defs: Defs): object {
  defs[group.title] ??= groupSchema(group, extra, defs);
  return { $ref: `#/$defs/${group.title}` };
}

function groupSchema(group: Group, extra: Record<string, object>, defs: Defs): object {
  const properties: Record<string, object> = { ...extra };
  for (const [name, field] of Object.entries(group.fields)) {
    const optional = group.presence[name] === 'optional';
    const inner = fieldSchema(field, defs, optional);
    properties[name] = optional ? { anyOf: [inner, { type: 'null' }], default: null } : inner;
  }
  const required = Object.keys(properties).filter((name) => name in extra || group.presence[name] === 'required');
  const eitherOr = Object.entries(group.presence).flatMap(([name, presence]) =>
    presence.startsWith('first of ') ? [{ anyOf: [{ required: [name] }, { required: [presence.slice('first of '.length)] }] }] : [],
  );
  const rules = [...group.rules.flatMap((rule) => rule.jsonSchema ?? []), ...eitherOr];
  return {
    title: group.title,
    description: group.description,
    type: 'object',
    properties,
    required,
    additionalProperties: false,
    ...(rules.length > 0 && { allOf: rules }),
  };
}

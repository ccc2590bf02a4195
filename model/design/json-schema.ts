/** A description (`kinds.ts`) as JSON Schema, draft 2020-12. Units stand in `x-unit` ("1" for a plain number) and in the description. */
import { defaultOf, type Field, type FieldInfo, type Group, keyField, memberDefaults, type Union } from './kinds.ts';
import { expectedOf, plainly } from './wording.ts';

/** Each group but the root becomes an entry of `$defs`, by its title. */
export function toJsonSchema(root: Group): Record<string, unknown> {
  const defs: Record<string, object> = {};
  const body = groupSchema(root, {}, defs);
  return { ...body, $defs: defs };
}

type Defs = Record<string, object>;

function fieldSchema(field: Field, defs: Defs): object {
  switch (field.kind) {
    case 'group':
      return { ...reference(field, {}, defs), default: defaultOf(field) };
    case 'union':
      return {
        title: field.title,
        description: field.description,
        oneOf: Object.entries(field.members).map(([key, member]) => reference(member, keySchema(field, key), defs)),
        default: memberDefaults(field, field.default),
      };
    case 'list':
      return {
        type: 'array',
        description: field.description,
        items: reference(field.item, {}, defs),
        minItems: field.min,
        maxItems: field.max,
      };
    default:
      return leafSchema(field);
  }
}

function leafSchema(field: FieldInfo): object {
  const usual = field.kind === 'number' && typeof field.default === 'number' ? plainly(field.default, field.unit) : String(field.default);
  const type = field.whole ? 'integer' : 'number';
  const notes = { description: `${field.description} ${expectedOf(field)}; default ${usual}.`, default: field.default };
  switch (field.kind) {
    case 'number':
      return {
        type: field.nullable ? [type, 'null'] : type,
        minimum: field.min,
        maximum: field.max,
        'x-unit': field.unit || '1',
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
  return { [union.key]: { const: key, description: keyField(union).description } };
}

function reference(group: Group, extra: Record<string, object>, defs: Defs): object {
  defs[group.title] ??= groupSchema(group, extra, defs);
  return { $ref: `#/$defs/${group.title}` };
}

function groupSchema(group: Group, extra: Record<string, object>, defs: Defs): object {
  const properties: Record<string, object> = { ...extra };
  for (const [name, field] of Object.entries(group.fields)) {
    const inner = fieldSchema(field, defs);
    properties[name] = group.presence[name] === 'optional' ? { anyOf: [inner, { type: 'null' }] } : inner;
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

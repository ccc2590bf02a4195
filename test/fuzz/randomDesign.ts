/**
 * Random designs over the whole document: the generator walks the schema, so that a field that is added is tried from that day on. Every design
 * that it makes is valid by the document's own checker.
 */
import { checkDesign } from '../../model/design/read.ts';
import type { Field, FieldInfo, Group, Union } from '../../model/design/kinds.ts';
import { designSchema } from '../../model/design/schema.ts';
import type { Design } from '../../model/design/types.ts';
import type { Dice } from './dice.ts';

/** `board`: values within a decade or two of the usual ones, so that the FET is at work. `wild`: the whole range that a field allows, its ends often. */
export type Temper = 'board' | 'wild';

const MOST_TRIES = 1000;

/** A design of one variant, with devices for both channels now and then. */
export function randomDesign(dice: Dice, temper: Temper): Design {
  const result = checkDesign(fieldValue(designSchema, dice, temper));
  if ('faults' in result) throw new Error(`the generator made an invalid design: ${result.faults[0].sentence}`);
  return result.design;
}

/** The same design with other numbers here and there: parts stay present or absent, so that its shape stays unless the law's exponent moves. */
export function movedDesign(design: Design, dice: Dice, temper: Temper): Design {
  for (let tries = 0; tries < MOST_TRIES; tries++) {
    const result = checkDesign(moved(designSchema, design, dice, temper));
    if ('design' in result) return result.design;
  }
  return design;
}

function fieldValue(field: Field, dice: Dice, temper: Temper): unknown {
  switch (field.kind) {
    case 'group':
      return groupValue(field, dice, temper);
    case 'union': {
      const key = dice.pick(Object.keys(field.members));
      return { [field.key]: key, ...groupValue(field.members[key], dice, temper) };
    }
    case 'list':
      return Array.from({ length: field.min }, () => fieldValue(field.item, dice, temper));
    case 'number':
      return field.nullable && dice.chance(0.5) ? null : numberIn(field, dice, temper);
    case 'text':
      return field.default;
    default:
      return dice.pick(field.choices as readonly unknown[]);
  }
}

/** Drawn again until the group's own rules are met. */
function groupValue(group: Group, dice: Dice, temper: Temper): Record<string, unknown> {
  for (let tries = 0; tries < MOST_TRIES; tries++) {
    const entries = Object.entries(group.fields)
      .filter(([name]) => group.presence[name] !== 'optional' || dice.chance(0.3))
      .map(([name, inner]) => [name, fieldValue(inner, dice, temper)]);
    const value = Object.fromEntries(entries);
    if (group.rules.every((rule) => rule.fault(value) === null)) return value;
  }
  throw new Error(`no valid ${group.title} in ${MOST_TRIES} tries`);
}

function numberIn({ min, max, default: usual, whole }: FieldInfo, dice: Dice, temper: Temper): number {
  if (whole) return dice.whole(min, max);
  const middle = typeof usual === 'number' ? usual : min > 0 ? Math.sqrt(min * max) : 0;
  const clip = (value: number) => Math.min(max, Math.max(min, value));
  if (temper === 'board') {
    if (min < 0) return clip(middle === 0 ? dice.sign() * Math.min(max, 2) : middle * dice.between(-0.5, 2));
    return middle === 0 ? (dice.chance(0.5) ? min : dice.decades(Math.max(min, max * 1e-9), max * 1e-3)) : clip(middle * 10 ** dice.sign());
  }
  const roll = dice.next();
  if (roll < 0.12) return min;
  if (roll < 0.24) return max;
  if (roll < 0.4) return middle;
  if (roll < 0.7) return clip(middle * 10 ** (2 * dice.sign()));
  const largest = Math.max(Math.abs(min), Math.abs(max));
  const size = dice.decades(min > 0 ? min : largest * 1e-9, largest);
  return clip(min < 0 && dice.chance(0.5) ? -size : size);
}

function moved(field: Field, value: unknown, dice: Dice, temper: Temper): unknown {
  if (value === null || value === undefined) return value;
  switch (field.kind) {
    case 'group':
      return movedGroup(field, value as Record<string, unknown>, dice, temper);
    case 'union': {
      const union = field as Union;
      const key = (value as Record<string, string>)[union.key];
      return { [union.key]: key, ...movedGroup(union.members[key], value as Record<string, unknown>, dice, temper) };
    }
    case 'list':
      return (value as unknown[]).map((item) => moved(field.item, item, dice, temper));
    case 'number': {
      const keep = field.whole || value === 0 || dice.chance(0.5);
      return keep ? value : numberIn({ ...field, min: field.min === 0 ? field.max * 1e-9 : field.min }, dice, temper);
    }
    default:
      return value;
  }
}

function movedGroup(group: Group, value: Record<string, unknown>, dice: Dice, temper: Temper): Record<string, unknown> {
  for (let tries = 0; tries < MOST_TRIES; tries++) {
    const entries = Object.entries(group.fields)
      .filter(([name]) => Object.hasOwn(value, name))
      .map(([name, inner]) => [name, moved(inner, value[name], dice, temper)]);
    const result = Object.fromEntries(entries);
    if (group.rules.every((rule) => rule.fault(result) === null)) return result;
  }
  return value;
}

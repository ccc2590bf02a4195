/** `fettle schema` */
import { jsonSchema } from '../design/schema.ts';
import type { Command } from './line.ts';

export const schema: Command = {
  name: 'schema',
  files: [],
  about: 'Prints the JSON Schema of a design: each field with its unit, range, default and meaning.',
  options: [],
  notes: 'The schema is of draft 2020-12 and goes to stdout.',
  run: () => void process.stdout.write(`${JSON.stringify(jsonSchema(), null, 2)}\n`),
};

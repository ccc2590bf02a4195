/** Reads what a source file imports, and judges each import by the rooms' rules. */

import { builtinModules } from 'node:module';
import { posix } from 'node:path';
import { parseSync, Visitor } from 'vite';

export interface Import {
  /** As written: `../device/math.ts`, `preact`, `node:fs`. */
  readonly target: string;
  /** Only types cross; nothing is loaded. */
  readonly typeOnly: boolean;
}

/** Every import of a source: static, re-export, dynamic, `import('…')` types, `new URL('…', import.meta.url)`. Throws if one cannot be read. */
export function readImports(path: string, source: string): Import[] {
  const parsed = parseSync(path, source);
  if (parsed.errors.length > 0) throw new Error(`${path}: ${parsed.errors[0].message}`);
  const found: Import[] = [];
  const add = (target: unknown, typeOnly: boolean) => {
    if (typeof target !== 'string')
      throw new Error(`${path}: an import is computed, so its arrow cannot be checked; expected a plain string`);
    found.push({ target, typeOnly });
  };
  const literal = (node: { type: string }) => ('value' in node ? node.value : undefined);
  new Visitor({
    ImportDeclaration: ({ source, importKind }) => add(source.value, importKind === 'type'),
    ExportNamedDeclaration: ({ source, exportKind }) => source && add(source.value, exportKind === 'type'),
    ExportAllDeclaration: ({ source, exportKind }) => add(source.value, exportKind === 'type'),
    ImportExpression: ({ source }) => add(literal(source), false),
    TSImportType: ({ source }) => add(source.value, true),
    NewExpression: ({ callee, arguments: [target, base] }) => {
      const besideThisFile = base?.type === 'MemberExpression' && base.object.type === 'MetaProperty';
      if (callee.type === 'Identifier' && callee.name === 'URL' && besideThisFile) add(literal(target), false);
    },
  }).visit(parsed.program);
  return found;
}

/** Rooms, the innermost folder first; each with what it may import. `types` of a room are its type-only imports. */
interface Rule {
  readonly room: string;
  readonly may: readonly string[];
  readonly mayTypes?: readonly string[];
  readonly packages: readonly string[];
  readonly node?: true;
}

const MATHS = 'model/device/math.ts';
const DESIGN_TYPES = 'model/design/types.ts';
const MODEL = ['design', 'device', 'cell', 'control', 'chain', 'measure', 'study'].map((name) => `model/${name}/`);

const RULES: readonly Rule[] = [
  { room: 'model/design/', may: [MATHS], packages: [] },
  { room: 'model/device/', may: [], mayTypes: [DESIGN_TYPES], packages: [] },
  { room: 'model/cell/', may: ['model/device/'], mayTypes: [DESIGN_TYPES], packages: [] },
  { room: 'model/control/', may: [MATHS], mayTypes: [DESIGN_TYPES], packages: [] },
  { room: 'model/chain/', may: ['model/design/', 'model/device/', 'model/cell/', 'model/control/'], packages: [] },
  { room: 'model/measure/', may: [MATHS], packages: ['fft.js'] },
  { room: 'model/study/', may: MODEL, packages: [] },
  { room: 'model/command/', may: MODEL, packages: ['tsx'], node: true },
  { room: 'worklet/', may: MODEL, packages: [] },
  {
    room: 'web/',
    may: ['worklet/protocol.ts', ...MODEL, 'assets/designs/'],
    packages: ['preact', '@preact/signals', 'idb', 'tone', 'standardized-audio-context', 'uplot'],
  },
];

/** Says what is wrong with one import of the file at `path` (from the root of the repository), or nothing. */
export function judgeImport(path: string, { target, typeOnly }: Import): string | undefined {
  const rule = RULES.find(({ room }) => path.startsWith(room));
  if (rule === undefined) return `${path} is in no room that has a rule`;
  if (mayImport(rule, path, target, typeOnly)) return undefined;
  return `${path} imports ${target}${typeOnly ? ' (types)' : ''}, which ${rule.room} may not`;
}

function mayImport(rule: Rule, path: string, target: string, typeOnly: boolean): boolean {
  if (target.startsWith('node:') || builtinModules.includes(target)) return rule.node === true;
  if (!/^[./]/.test(target)) return rule.packages.some((name) => target === name || target.startsWith(`${name}/`));
  const [file, query] = posix.join(posix.dirname(path), target).split('?');
  if (rule.room === 'web/' && query === 'worker&url') return file.startsWith('worklet/') || file.startsWith('web/');
  const within = (places: readonly string[] = []) =>
    places.some((place) => file === place || (place.endsWith('/') && file.startsWith(place)));
  return file.startsWith(rule.room) || within(rule.may) || (typeOnly && within(rule.mayTypes));
}

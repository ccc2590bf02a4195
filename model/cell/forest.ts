/** Which capacitors' voltages are independent: a spanning forest over sources and capacitors. */
import { type Element, GROUND } from './circuit.ts';

type Capacitor = Extract<Element, { kind: 'capacitor' }>;

/** A node's voltage as that of its root plus states (with signs) plus audio and control voltage. */
interface Reach {
  readonly root: string;
  readonly states: ReadonlyMap<number, number>;
  readonly sources: readonly [number, number];
}

export interface Forest {
  /** Elements that are states, coupling capacitors first; and those that close loops. */
  readonly trees: readonly number[];
  readonly links: readonly number[];
  /** The voltage of a capacitor as a sum of those in `trees`, and of the audio and the control voltage. */
  voltageOf(element: number): { fromTrees: Float64Array; fromSources: Float64Array };
}

/** Throws a RangeError when a node is driven twice. */
export function chooseForest(elements: readonly Element[], nodes: readonly string[]): Forest {
  const reach = new Map<string, Reach>();
  for (const name of [GROUND, ...nodes]) reach.set(name, { root: name, states: new Map(), sources: [0, 0] });
  for (const element of elements) {
    if (element.kind !== 'source') continue;
    if (reach.get(element.node)?.root === GROUND) throw new RangeError(`node ${element.node} is driven twice; expected one source`);
    reach.set(element.node, { root: GROUND, states: new Map(), sources: element.drive === 'audio' ? [1, 0] : [0, 1] });
  }
  const order = ['coupling', 'parasitic'].flatMap((role) =>
    elements.flatMap((element, index) => (element.kind === 'capacitor' && element.role === role ? [index] : [])),
  );
  const trees: number[] = [];
  const links: number[] = [];
  const ends = (index: number) => {
    const { a, b } = elements[index] as Capacitor;
    return [reach.get(a) as Reach, reach.get(b) as Reach] as const;
  };
  for (const index of order) {
    const [from, to] = ends(index);
    if (from.root === to.root) links.push(index);
    else join(reach, from, to, trees.push(index) - 1);
  }
  return {
    trees,
    links,
    voltageOf(index) {
      const fromTrees = new Float64Array(trees.length);
      const fromSources = new Float64Array(2);
      if (elements[index].kind !== 'capacitor') return { fromTrees, fromSources };
      const [from, to] = ends(index);
      for (const [state, sign] of from.states) fromTrees[state] += sign;
      for (const [state, sign] of to.states) fromTrees[state] -= sign;
      fromSources[0] = from.sources[0] - to.sources[0];
      fromSources[1] = from.sources[1] - to.sources[1];
      return { fromTrees, fromSources };
    },
  };
}

/** Hangs one tree on the other by the new state, whose voltage is v(from) − v(to). Ground stays a root. */
function join(reach: Map<string, Reach>, from: Reach, to: Reach, state: number): void {
  const fromHangs = to.root === GROUND || from.root !== GROUND;
  const hanging = fromHangs ? from : to;
  const fixed = fromHangs ? to : from;
  const sign = fromHangs ? 1 : -1;
  const moved = hanging.root;
  for (const [name, old] of reach) {
    if (old.root !== moved) continue;
    const states = new Map(old.states);
    const add = (key: number, amount: number) => states.set(key, (states.get(key) ?? 0) + amount);
    for (const [key, value] of fixed.states) add(key, value);
    for (const [key, value] of hanging.states) add(key, -value);
    add(state, sign);
    const sources = [0, 1].map((k) => old.sources[k] + fixed.sources[k] - hanging.sources[k]) as [number, number];
    reach.set(name, { root: fixed.root, states, sources });
  }
}

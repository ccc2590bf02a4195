/**
 * Circuits as data: a list of elements between named nodes. `ground` is the reference node.
 * A new circuit is a new list; the solver does not know one from another.
 */

export const GROUND = 'ground';

interface Between {
  readonly name: string;
  readonly a: string;
  readonly b: string;
}

/** Linear elements and sources. Each has one value that may move while the circuit runs, in the SI unit that its name ends in. */
export type Element =
  | (Between & { readonly kind: 'conductance'; readonly valueS: number })
  | (Between & {
      readonly kind: 'capacitor';
      readonly valueF: number;
      /** `coupling` is advanced by the trapezoidal rule, `parasitic` (picofarads, stiff) by backward differences. */
      readonly role: 'coupling' | 'parasitic';
    })
  | (Between & { readonly kind: 'inductor'; readonly valueH: number })
  /** A voltage source from ground to `node`: the audio, the control, or a constant. */
  | { readonly kind: 'source'; readonly name: string; readonly node: string; readonly drive: 'audio' | 'control' }
  | { readonly kind: 'supply'; readonly name: string; readonly node: string; readonly valueV: number }
  /** A constant current drawn from `node` to ground. */
  | { readonly kind: 'draw'; readonly name: string; readonly node: string; readonly valueA: number }
  /** A current into `node` for each volt at `sensed`. */
  | { readonly kind: 'transconductance'; readonly name: string; readonly node: string; readonly sensed: string; readonly valueS: number }
  /** An ideal buffer whose output is the voltage of `direct` plus `fraction` of that of `plus` less `minus`. */
  | {
      readonly kind: 'summer';
      readonly name: string;
      readonly output: string;
      readonly direct: string;
      readonly plus: string;
      readonly minus: string;
      readonly fraction: number;
    };

/** A diode from gate to source pin that keeps the gate from rising: saturation current and ideality. */
export interface Clamp {
  readonly reverseA: number;
  readonly ideality: number;
}

/** The nonlinear element. Its leakages and constant capacitances stand in the list of elements. */
export interface Jfet {
  readonly drain: string;
  readonly gate: string;
  readonly source: string;
  readonly clamp: Clamp | null;
}

export interface Circuit {
  readonly elements: readonly Element[];
  readonly jfet: Jfet;
  /** The node whose voltage is the cell's output. */
  readonly outputNode: string;
}

/** The movable quantity of an element; NaN for a driven source, which has none. */
export function elementValue(element: Element): number {
  switch (element.kind) {
    case 'conductance':
    case 'transconductance':
      return element.valueS;
    case 'capacitor':
      return element.valueF;
    case 'inductor':
      return element.valueH;
    case 'supply':
      return element.valueV;
    case 'draw':
      return element.valueA;
    case 'summer':
      return element.fraction;
    case 'source':
      return Number.NaN;
  }
}

/** The nodes that an element touches. */
export function elementNodes(element: Element): string[] {
  switch (element.kind) {
    case 'conductance':
    case 'capacitor':
    case 'inductor':
      return [element.a, element.b];
    case 'source':
    case 'supply':
    case 'draw':
      return [element.node];
    case 'transconductance':
      return [element.node, element.sensed];
    case 'summer':
      return [element.output, element.direct, element.plus, element.minus];
  }
}

/** What must be equal for two circuits to differ in values only. */
export function circuitShape(circuit: Circuit): string {
  const parts = circuit.elements.map((element) => {
    const detail = element.kind === 'source' ? element.drive : element.kind === 'capacitor' ? element.role : '';
    return [element.kind, detail, ...elementNodes(element)].join(':');
  });
  const { drain, gate, source, clamp } = circuit.jfet;
  return [...parts, drain, gate, source, clamp ? 'clamp' : '', circuit.outputNode].join(' ');
}

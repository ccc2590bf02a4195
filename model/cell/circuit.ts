/**
 * Circuits as data: a list of elements between named nodes. `ground` is the reference node.
 * A new circuit is a new list; the solver does not know one from another.
 */

export const GROUND = 'ground';

/** Linear elements and sources. `value` is the quantity that may move while the circuit runs, in SI units. */
export type Element =
  | { readonly kind: 'conductance'; readonly name: string; readonly a: string; readonly b: string; readonly valueS: number }
  | {
      readonly kind: 'capacitor';
      readonly name: string;
      readonly a: string;
      readonly b: string;
      readonly valueF: number;
      /** `coupling` is advanced by the trapezoidal rule, `parasitic` (picofarads, stiff) by backward Euler. */
      readonly role: 'coupling' | 'parasitic';
    }
  /** A voltage source from ground to `node`. */
  | { readonly kind: 'source'; readonly name: string; readonly node: string; readonly drive: 'audio' | 'control' }
  /** An ideal buffer whose output is the voltage of `direct` plus `fraction` of that of `scaled`. */
  | {
      readonly kind: 'summer';
      readonly name: string;
      readonly output: string;
      readonly direct: string;
      readonly scaled: string;
      readonly fraction: number;
    };

/** The nonlinear element. Its leakages and capacitances stand in the list of elements. */
export interface Jfet {
  readonly drain: string;
  readonly gate: string;
  readonly source: string;
}

export interface Circuit {
  readonly elements: readonly Element[];
  readonly jfet: Jfet;
  /** The node whose voltage is the cell's output. */
  readonly outputNode: string;
}

/** The movable quantity of an element: S, F, or a fraction; NaN for a source, which has none. */
export function elementValue(element: Element): number {
  if (element.kind === 'conductance') return element.valueS;
  if (element.kind === 'capacitor') return element.valueF;
  return element.kind === 'summer' ? element.fraction : Number.NaN;
}

/** What must be equal for two circuits to differ in values only. */
export function circuitShape(circuit: Circuit): string {
  const parts = circuit.elements.map((element) => {
    if (element.kind === 'source') return `${element.drive}:${element.node}`;
    if (element.kind === 'summer') return `summer:${element.output}:${element.direct}:${element.scaled}`;
    const role = element.kind === 'capacitor' ? element.role : '';
    return `${element.kind}${role}:${element.a}:${element.b}`;
  });
  const { drain, gate, source } = circuit.jfet;
  return [...parts, `${drain}:${gate}:${source}`, circuit.outputNode].join(' ');
}

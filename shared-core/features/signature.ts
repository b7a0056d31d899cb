import type { Span } from "../text/span.ts";
import {
  type FunctionDescription,
  functionOf,
  type ParameterDescription,
  signature,
} from "../vocabulary/functions.ts";
import { typedLine, type Word } from "./complete-line.ts";
import { type OpenCall, valuePlace } from "./complete-value.ts";
import type { View } from "./view.ts";

/** How a call is written, and which of its arguments is being typed. */
export interface Signature {
  /** `shaft(G, diameter, length, bore: 0)`. */
  readonly label: string;
  /** What it computes, in a sentence; Markdown. */
  readonly documentation: string;
  readonly parameters: readonly SignatureParameter[];
  /** Index of the argument; undefined behind the last one. */
  readonly active?: number;
}

export interface SignatureParameter {
  /** In the label. */
  readonly span: Span;
  readonly documentation: string;
}

/** The innermost call that is open at an offset: a function, `if`, or a kit that a `part` places. */
export function signatureHelp(view: View, offset: number): Signature | undefined {
  const line = typedLine(view.model.tree, offset);
  if (line.inside) return undefined;
  const start = line.words[0]?.start ?? line.offset;
  const { call } = valuePlace(withoutHead(line.words), start, line.tree.text);
  if (call === undefined) return undefined;
  const fn = functionOf(call.callee);
  if (fn) return ofFunction(fn, call);
  return call.callee === "if" ? ofNames("if", IF_PARAMETERS, IF_SAYS, call) : ofKit(view, call);
}

/** `at` and `from` of a head would be read as words of a value. */
const withoutHead = (words: readonly Word[]): readonly Word[] => {
  const equals = words.findIndex(({ text }) => text === "=");
  return words.slice(equals + 1);
};

const IF_PARAMETERS = [
  ["condition", "a comparison, or several with `and`, `or`, `not`"],
  ["then", "the value where it holds"],
  ["else", "the value where it does not"],
] as const;
const IF_SAYS = "one of two values, of which only that one is computed";

function ofFunction(fn: FunctionDescription, call: OpenCall): Signature {
  const label = signature(fn);
  const texts = parametersIn(label);
  const { says, formula, validity, notYet } = fn;
  const lines = [says, formula && `\`${formula}\``, validity, notYet && "Not computed by this version."];
  return {
    label,
    documentation: lines.filter((each) => each).join("\n\n"),
    parameters: texts.map((span, i) => {
      const parameter = fn.parameters[Math.min(i, fn.parameters.length - 1)];
      return { span, documentation: parameterText(parameter) };
    }),
    active: activeOf(fn.parameters, texts.length, call),
  };
}

function parameterText({ says, optional, standard }: ParameterDescription): string {
  if (!optional) return says;
  return standard === undefined ? `${says}; may be left out` : `${says}; left out: ${standard}`;
}

function activeOf(
  parameters: readonly ParameterDescription[],
  shown: number,
  call: OpenCall,
): number | undefined {
  if (call.argument !== undefined) {
    const index = parameters.findIndex(({ name }) => name === call.argument);
    return index < 0 ? undefined : index;
  }
  if (call.index < parameters.length && !parameters[call.index].repeated) return call.index;
  return parameters.at(-1)?.repeated ? Math.min(call.index, shown - 1) : undefined;
}

function ofNames(
  name: string,
  parameters: readonly (readonly [name: string, says: string])[],
  documentation: string,
  { index, argument }: OpenCall,
): Signature {
  const label = `${name}(${parameters.map(([each]) => each).join(", ")})`;
  const named = parameters.findIndex(([each]) => each === argument);
  const active = argument === undefined ? index : named;
  return {
    label,
    documentation,
    parameters: parametersIn(label).map((span, i) => ({ span, documentation: parameters[i]?.[1] ?? "" })),
    active: 0 <= active && active < parameters.length ? active : undefined,
  };
}

function ofKit({ model }: View, call: OpenCall): Signature | undefined {
  const kit = model.entities.get(call.callee);
  const parameters = kit?.node.slots.parameters;
  if (kit?.keyword !== "kit" || parameters?.kind !== "parameters" || parameters.items.length === 0)
    return undefined;
  const notes = kit.node.notes.map(({ text }) => text).join("\n");
  return ofNames(
    kit.name,
    parameters.items.map(({ text }) => [text, "a parameter of the kit"] as const),
    notes,
    call,
  );
}

/** Where the parameters stand in a label. */
function parametersIn(label: string): Span[] {
  const open = label.indexOf("(") + 1;
  const inner = label.slice(open, label.lastIndexOf(")"));
  if (inner === "") return [];
  let at = open;
  return inner.split(", ").map((part) => {
    const span = { start: at, end: at + part.length };
    at = span.end + 2;
    return span;
  });
}

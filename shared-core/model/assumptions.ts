import { detailOf } from "../vocabulary/registry.ts";
import { type Given, singleValue } from "./details.ts";
import { type Draft, spoil } from "./draft.ts";
import { type Described, nameIn } from "./names.ts";
import { planNumber } from "./number.ts";
import { wantedOf } from "./typed.ts";

/** Takes `assume KEY = VALUE` into the draft. */
export function planAssumption({ node, description }: Described, draft: Draft): void {
  const key = nameIn(node, "key");
  const known =
    description.keys?.find((each) => each.key === key?.text) ?? (key && detailOf(description, key.text));
  if (key === undefined || known === undefined || node.value === undefined || node.broken) {
    spoil(draft, undefined);
    return;
  }
  const before = draft.assumptions.get(key.text);
  if (before !== undefined) {
    draft.findings.say("duplicate-name", key.span, `\`${key.text}\` is assumed twice`, {
      related: [{ span: before.span, message: "here it is assumed first" }],
    });
    return;
  }
  if (known.content.is !== "quantity") return;
  const given: Given = { key: key.text, description: known, items: node.value, span: key.span };
  const value = singleValue(given, draft.findings);
  const wanted = wantedOf(known.content.measure);
  const number = value && planNumber(value, draft.numbers, wanted, key.text);
  if (number === undefined) spoil(draft, undefined);
  else draft.assumptions.set(key.text, number);
}

/** What expectation-fails and expectation-thin say alike. */
import type { Judged, RuleContext } from "../rule.ts";
import { showAs } from "../shown-unit.ts";

/** The left side as it is written. */
export function leftText({ model }: RuleContext, { expectation }: Judged): string {
  return model.tree.text.slice(expectation.left.span.start, expectation.left.span.end).replace(/\s+/g, " ");
}

/** `at most 12 %`. */
export function limitText({ instance }: RuleContext, { verdict, expectation }: Judged): string {
  const limit = { ...verdict.kind, value: verdict.limit ?? 0 };
  return `${WORDS[expectation.operator]} ${showAs(limit, instance, expectation.right, expectation.left)}`;
}

const WORDS = { "<=": "at most", ">=": "at least", "<": "less than", ">": "more than" } as const;

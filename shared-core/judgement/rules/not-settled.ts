import { detailOf, nameSpan } from "../places.ts";
import type { Finding, Rule } from "../rule.ts";

/** A history that ends before what is read from it has settled. */
export const notSettled: Rule = {
  code: "not-settled",
  cost: "answers",
  check({ judged }) {
    const findings = new Map<string, Finding>();
    for (const { remarks } of judged) {
      for (const { code, ask, message, hint } of remarks) {
        if (code !== "not-settled") continue;
        const lasting = detailOf(ask.node, "lasting")?.items[0];
        findings.set(message, { span: lasting?.span ?? nameSpan(ask.node), message, hint });
      }
    }
    return [...findings.values()];
  },
};

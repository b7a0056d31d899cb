import type { Assembly } from "../mechanics/assembly.ts";
import { equilibrium, positiveGravity } from "../mechanics/equilibrium.ts";
import { formValue } from "../mechanics/forms.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { StaticResponse } from "./analysis.ts";

/** Travel and force of every element when gravity acts on every mass in its positive direction. */
export function staticResponse(assembly: Assembly): Outcome<StaticResponse> {
  const solved = equilibrium(assembly, positiveGravity(assembly));
  if (!solved.ok) return fail(solved.reason);
  const { q, looseIn } = solved.value;
  return succeed({
    element(index) {
      const element = assembly.elements[index];
      if (element === undefined) return fail("there is no such element");
      const loose = looseIn(element.form);
      if (loose !== undefined) return fail(`no spring holds ${loose} against its weight`);
      const travel = formValue(element.form, q);
      const pull = element.stiffness * travel;
      return succeed({ travel: Math.abs(travel), force: Math.abs(pull), pull });
    },
  });
}

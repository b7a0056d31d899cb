import type { Rule } from "../rule.ts";
import { passedRatings } from "./rated.ts";

/** A rated force is passed in an answer; the rating is for one of `count`. */
export const forceExceeded: Rule = {
  code: "force-exceeded",
  cost: "answers",
  check: (context) => passedRatings(context, "force"),
};

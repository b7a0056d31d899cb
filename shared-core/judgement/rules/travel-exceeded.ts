import type { Rule } from "../rule.ts";
import { passedRatings } from "./rated.ts";

/** A rated travel is passed in an answer. */
export const travelExceeded: Rule = {
  code: "travel-exceeded",
  cost: "answers",
  check: (context) => passedRatings(context, "travel"),
};

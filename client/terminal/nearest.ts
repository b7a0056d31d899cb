/** Loaded when somebody mistyped a word. */
export { nearest } from "../../shared-core/index.ts";

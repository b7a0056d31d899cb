/** What the launcher in main.ts loads: every command, as one bundle. */
export { processHost } from "./host.ts";
export { runCommand } from "./run.ts";

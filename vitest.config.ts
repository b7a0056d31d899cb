import { defineConfig } from "vitest/config";

// The time limit only ends what hangs: on a busy machine the longest tests take minutes.
export default defineConfig({
  test: { include: ["test/**/*.test.ts"], testTimeout: 300_000, maxWorkers: 2 },
});

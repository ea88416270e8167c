import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    root: new URL("..", import.meta.url).pathname,
    include: ["packages/*/test/**/*.test.ts", "test/**/*.test.ts"],
    testTimeout: 120_000,
    reporters: ["default", new URL("./tally-reporter.ts", import.meta.url).pathname],
  },
});

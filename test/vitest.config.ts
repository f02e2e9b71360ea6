import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    include: ["test/**/*.test.ts"],
    setupFiles: ["test/support/propertySeed.ts"],
    globalSetup: ["test/support/globalSetup.ts"],
    // Many tests wait (for a server that stalls, a lease that runs out): more workers than processors.
    maxWorkers: 3,
    testTimeout: 120_000,
    hookTimeout: 120_000,
  },
});

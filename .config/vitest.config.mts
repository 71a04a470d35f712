import { defineConfig } from "vitest/config";

// One configuration for both suites: SUITE=slow runs the long sweeps instead of the everyday tests.
const slow = process.env.SUITE === "slow";

export default defineConfig({
  test: {
    include: slow ? ["test/**/*.slow.test.ts"] : ["test/**/*.test.ts"],
    exclude: slow ? [] : ["test/**/*.slow.test.ts"],
    testTimeout: slow ? 3_600_000 : 120_000,
    hookTimeout: 240_000,
  },
});

import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    include: ["src/**/*.test.{ts,tsx}", "workers/**/*.test.ts", "tests/**/*.test.ts"],
    // Real videos are encoded, decoded and measured, on machines with two cores.
    testTimeout: 180_000,
    hookTimeout: 240_000,
    pool: "forks",
    maxWorkers: 2,
  },
});

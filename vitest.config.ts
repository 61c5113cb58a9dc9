import { defineConfig } from "vitest/config";

// Three suites: common (each commit), slow (soaks and long random tests), hosts (real front ends from Debian).
export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: "common",
          include: ["test/**/*.test.ts"],
          exclude: ["test/hosts/**", "**/*.slow.test.ts", "node_modules/**"],
          testTimeout: 30_000,
          hookTimeout: 300_000,
        },
      },
      { test: { name: "slow", include: ["test/**/*.slow.test.ts"], testTimeout: 900_000 } },
      {
        test: {
          name: "hosts",
          include: ["test/hosts/**/*.test.ts"],
          exclude: ["**/*.slow.test.ts"],
          testTimeout: 180_000,
          hookTimeout: 600_000,
          fileParallelism: false,
        },
      },
    ],
  },
});

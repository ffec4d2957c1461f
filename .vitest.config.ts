import { defineConfig } from "vitest/config";

/** `npm test` runs the project "node"; `npm run test:browser`, which needs a Chromium, the project "browser". */
export default defineConfig({
  test: {
    testTimeout: 60_000,
    hookTimeout: 60_000,
    projects: [
      {
        extends: true,
        test: { name: "node", include: ["tests/**/*.test.ts"], exclude: ["tests/browser/**"] },
      },
      { extends: true, test: { name: "browser", include: ["tests/browser/**/*.test.ts"] } },
    ],
    coverage: { include: ["src/**"], exclude: ["src/cli/main.ts"] },
  },
});

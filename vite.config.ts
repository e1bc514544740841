import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vitest/config";

const apiPort = process.env["API_PORT"] ?? "3001";

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: { outDir: "dist/client", sourcemap: true, target: "baseline-widely-available" },
  worker: { format: "es" },
  server: { proxy: { "/api": `http://127.0.0.1:${apiPort}` } },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: "shared",
          environment: "node",
          include: ["tests/shared/**/*.test.ts"],
          setupFiles: ["tests/fixtures/no-console-errors.ts"],
        },
      },
      {
        extends: true,
        test: {
          name: "server",
          environment: "node",
          include: ["tests/server/**/*.test.ts"],
          setupFiles: ["tests/fixtures/no-console-errors.ts"],
          testTimeout: 20_000,
        },
      },
      {
        extends: true,
        test: {
          name: "src",
          environment: "jsdom",
          include: ["tests/src/**/*.test.{ts,tsx}"],
          setupFiles: ["tests/fixtures/no-console-errors.ts", "tests/src/setup.ts"],
        },
      },
      {
        extends: true,
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.ts"],
          globalSetup: ["tests/e2e/global.ts"],
          testTimeout: 90_000,
          hookTimeout: 90_000,
          fileParallelism: false,
        },
      },
    ],
  },
});

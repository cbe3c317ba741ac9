// One vitest set-up for the whole tree: plain Node, files in parallel, a generous limit for the browser scenarios.
import { fileURLToPath } from "node:url";
import { defineConfig } from "vitest/config";
import { assemblyPlugin } from "../resources/build/assemblyPlugin.ts";

export default defineConfig({
  root: fileURLToPath(new URL("..", import.meta.url)),
  plugins: [assemblyPlugin()],
  test: {
    include: ["tests/**/*.test.ts", "tests/**/*.test.tsx"],
    testTimeout: 30_000,
    hookTimeout: 60_000,
  },
});

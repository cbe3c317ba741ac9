// Builds the benchmark for Node beside its results: the real code of src with its kernels, packages left outside.
import { fileURLToPath } from "node:url";
import { defineConfig } from "vite";
import { assemblyPlugin } from "../../resources/build/assemblyPlugin.ts";

const at = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

export default defineConfig({
  root: at("../.."),
  plugins: [assemblyPlugin()],
  build: {
    ssr: true,
    target: "node24",
    outDir: at("../../.artefacts/bench"),
    emptyOutDir: true,
    rollupOptions: {
      input: { main: at("main.ts"), peak: at("peak.ts"), computeBlocks: at("../../src/workers/computeBlocks.ts") },
      output: { entryFileNames: "[name].js" },
    },
  },
});

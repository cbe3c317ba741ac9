/**
 * One build for all shells: the Electron main process, the loopback server, the command line and the start-up are entries of
 * `main`, and so is the worker that sums blocks of rows; the preload is one CommonJS file, as a sandboxed page needs; the screens are the renderer.
 * `dependencies` stay outside the bundle, devDependencies go in. Minified, because the plain output of `main` can hold
 * absolute source paths in comments.
 */
import { fileURLToPath } from "node:url";
import react from "@vitejs/plugin-react";
import { defineConfig } from "electron-vite";
import { assemblyPlugin } from "./resources/build/assemblyPlugin.ts";

const at = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

export default defineConfig({
  main: {
    plugins: [assemblyPlugin()],
    build: {
      minify: true,
      // Electron 45 and the pinned Node both run V8 of this level; electron-vite's own table ends one Electron earlier.
      target: "node24",
      rollupOptions: {
        input: {
          index: at("src/shells/electron/main.ts"),
          server: at("src/shells/browser/main.ts"),
          cli: at("src/shells/cli/main.ts"),
          start: at("src/shells/start/main.ts"),
          computeBlocks: at("src/workers/computeBlocks.ts"),
        },
      },
    },
  },
  preload: {
    build: {
      minify: true,
      rollupOptions: {
        input: { index: at("src/shells/electron/preload.ts") },
        output: { format: "cjs", entryFileNames: "[name].cjs" },
      },
    },
  },
  renderer: {
    root: at("src/screens"),
    plugins: [react()],
    build: {
      minify: true,
      outDir: at("out/renderer"),
      // Nothing is inlined as a data: address, so that the page's content policy can refuse them.
      assetsInlineLimit: 0,
      rollupOptions: { input: { index: at("src/screens/index.html") } },
    },
  },
});

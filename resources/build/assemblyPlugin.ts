/**
 * A Vite plugin for readable SIMD: an import such as `./assembly/index.ts?wasm` compiles that AssemblyScript file and gives a
 * module whose default export is the WebAssembly binary as a base64 string. Used by the build of the shells and by the tests.
 * The binary is kept under node_modules/.cache by a hash of its sources and settings, so that an unchanged kernel costs nothing.
 * Strict arithmetic only: 128-bit SIMD without the relaxed (fused) instructions, whose last bits differ between machines.
 */
import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import asc from "assemblyscript/asc";
import type { Plugin } from "vite";
import type {} from "vitest/node";

const MARK = "?wasm";
const root = fileURLToPath(new URL("../..", import.meta.url));
const cacheFolder = join(root, "node_modules/.cache/lotwright-kernels");
const SETTINGS = ["--optimizeLevel", "3", "--converge", "--noAssert", "--runtime", "stub", "--enable", "simd"];

export function assemblyPlugin(): Plugin {
  return {
    name: "lotwright-assembly",
    enforce: "pre",
    // Vitest keeps modules by the text of one file, but a binary comes from several.
    configureVitest({ defineCacheKeyGenerator }) {
      defineCacheKeyGenerator(({ id }) => (id.endsWith(MARK) ? false : undefined));
    },
    async resolveId(source, importer) {
      if (!source.endsWith(`.ts${MARK}`)) return null;
      const file = await this.resolve(source.slice(0, -MARK.length), importer, { skipSelf: true });
      return file === null ? null : `${file.id}${MARK}`;
    },
    async load(id) {
      if (!id.endsWith(`.ts${MARK}`)) return null;
      const entry = id.slice(0, -MARK.length);
      const sources = sourcesOf(entry);
      for (const file of sources) this.addWatchFile(file);
      const binary = await compiled(entry, sources);
      return `export default ${JSON.stringify(binary.toString("base64"))};`;
    },
  };
}

/** The assembly files beside the entry, and the constants that both languages read one folder up. */
function sourcesOf(entry: string): string[] {
  const folder = dirname(entry);
  const beside = readdirSync(folder)
    .filter((name) => name.endsWith(".ts"))
    .sort()
    .map((name) => join(folder, name));
  return [...beside, join(folder, "../layout.ts")];
}

async function compiled(entry: string, sources: readonly string[]): Promise<Buffer> {
  const hash = createHash("sha256").update(asc.version).update(SETTINGS.join(" "));
  for (const file of sources) hash.update(relative(root, file)).update(readFileSync(file));
  const cached = join(cacheFolder, `${hash.digest("hex")}.wasm`);
  if (existsSync(cached)) return readFileSync(cached);
  const binary = await compile(relative(root, entry));
  mkdirSync(cacheFolder, { recursive: true });
  writeFileSync(cached, binary);
  return binary;
}

async function compile(entry: string): Promise<Buffer> {
  let binary: Uint8Array | undefined;
  const { error, stderr } = await asc.main([entry, "--outFile", "kernel.wasm", "--baseDir", root, ...SETTINGS], {
    readFile: (name, baseDir) => {
      const file = resolve(baseDir, name);
      return existsSync(file) ? readFileSync(file, "utf8") : null;
    },
    writeFile: (name, contents) => {
      if (name === "kernel.wasm") binary = contents as Uint8Array;
    },
    listFiles: () => [],
  });
  if (error !== null || binary === undefined) throw new Error(`${entry} does not compile:\n${stderr.toString()}`);
  return Buffer.from(binary);
}

/**
 * Who may import whom, read from the import lines of every file in src. The table is that of the design: a room, the rooms of
 * ours that it may import, and the packages it may use. Names each arrow that is not in it.
 */
import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, relative, resolve, sep } from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";

const src = fileURLToPath(new URL("../src", import.meta.url));

const COMPUTING = ["numerics", "evidence", "hedonic", "valuation", "explanation", "trackRecord", "sheet", "import"];

interface Room {
  readonly rooms: readonly string[];
  readonly packages: readonly RegExp[];
}

const nothing: readonly RegExp[] = [];
/** node:crypto is a pure function of bytes; node:fs and the like are for rooms that touch the machine. */
const ROOMS: Readonly<Record<string, Room>> = {
  domain: { rooms: [], packages: nothing },
  numerics: { rooms: [], packages: [/^ml-matrix$/, /^jstat$/, /^@stdlib\//] },
  evidence: { rooms: ["domain"], packages: nothing },
  import: { rooms: ["domain"], packages: nothing },
  hedonic: { rooms: ["domain", "numerics"], packages: nothing },
  valuation: { rooms: ["domain", "numerics", "hedonic"], packages: nothing },
  explanation: { rooms: ["domain", "numerics", "hedonic", "valuation"], packages: nothing },
  trackRecord: { rooms: ["domain", "numerics", "hedonic", "valuation", "explanation"], packages: nothing },
  sheet: { rooms: ["domain"], packages: [/^pdfkit$/, /^node:(zlib|stream|buffer|crypto)$/] },
  store: { rooms: ["domain"], packages: [/^better-sqlite3$/, /^node:/] },
  contract: { rooms: ["domain", ...COMPUTING], packages: [/^zod$/] },
  workers: { rooms: ["domain", ...COMPUTING], packages: [/^node:worker_threads$/] },
  app: { rooms: ["domain", "contract", "store", ...COMPUTING], packages: nothing },
  shells: { rooms: ["app", "contract", "workers", "store", "domain"], packages: [/^node:/] },
  screens: {
    rooms: ["contract", "domain"],
    packages: [/^react($|\/)/, /^react-dom($|\/)/, /^recharts$/, /^@tanstack\//, /^@fontsource\//],
  },
};

/** Finer than a room: where a package or a room may be used by some files only. */
const PLACES: readonly { readonly what: RegExp; readonly where: RegExp; readonly why: string }[] = [
  { what: /^better-sqlite3$/, where: /^store\//, why: "the database stays in store" },
  { what: /^electron$/, where: /^shells\/electron\//, why: "electron stays in shells/electron" },
  { what: /^node:https?$/, where: /^shells\/browser\//, why: "node:http stays in shells/browser" },
  { what: /^papaparse$/, where: /^import\/formats\//, why: "a parser stays with its format" },
  { what: /^zod$/, where: /^contract\//, why: "checks of input stay in contract" },
  { what: /^@store$/, where: /^shells\/openWorkshop\.ts$/, why: "a shell opens the store in one place" },
];
const PLACED_PACKAGES = [/^electron$/, /^papaparse$/];

interface Arrow {
  readonly file: string;
  readonly to: string;
}

const files = readdirSync(src, { recursive: true, encoding: "utf8" })
  .map((path) => path.split(sep).join("/"))
  .filter((path) => /\.tsx?$/.test(path));

/** Static imports, re-exports and dynamic imports; a comment's or a string's mention is none. */
function importsOf(text: string): string[] {
  const lines = [
    /^\s*(?:import|export)\s[^;"']*?from\s*["']([^"']+)["']/gm,
    /^\s*import\s*["']([^"']+)["']/gm,
    /\bimport\(\s*["']([^"']+)["']\s*\)/g,
  ];
  return lines.flatMap((line) => [...text.matchAll(line)].map((match) => match[1]!));
}

const arrows: Arrow[] = files.flatMap((file) =>
  importsOf(readFileSync(join(src, file), "utf8")).map((to) => ({ file, to })),
);

/** The room of a relative import, or null for a package. Something outside src (a style sheet's folder, say) has no room. */
function targetOf({ file, to }: Arrow): { room: string | null; path: string } {
  if (!to.startsWith(".")) return { room: null, path: to };
  const path = relative(src, resolve(dirname(join(src, file)), to.split("?")[0]!))
    .split(sep)
    .join("/");
  return { room: path.split("/")[0]!, path };
}

function faultOf(arrow: Arrow): string | null {
  const own = arrow.file.split("/")[0]!;
  const room = ROOMS[own];
  if (room === undefined) return `${arrow.file}: ${own} is not a room`;
  const target = targetOf(arrow);
  const name = `${arrow.file} → ${target.path}`;
  const placed = target.room === "store" && own === "shells" ? "@store" : target.path;
  const place = PLACES.find((rule) => rule.what.test(placed));
  if (place !== undefined && !place.where.test(arrow.file)) return `${name}: ${place.why}`;
  if (target.room === null) {
    const may = [...room.packages, ...PLACED_PACKAGES].some((pattern) => pattern.test(target.path));
    return may ? null : `${name}: ${own} may not use this package`;
  }
  if (target.path.startsWith("..")) return `${name}: outside src`;
  return target.room === own || room.rooms.includes(target.room)
    ? null
    : `${name}: ${own} may not import ${target.room}`;
}

describe("the rooms of src", () => {
  test("every file lies in a known room", () => {
    expect(files.length).toBeGreaterThan(0);
    expect(files.filter((file) => ROOMS[file.split("/")[0]!] === undefined)).toEqual([]);
  });

  test("no arrow leaves the table of who may import whom", () => {
    expect(arrows.length).toBeGreaterThan(0);
    expect(arrows.map(faultOf).filter((fault) => fault !== null)).toEqual([]);
  });

  test("forbidden arrows are found and named", () => {
    const fault = (file: string, to: string): string | null => faultOf({ file, to });
    expect(fault("domain/sale.ts", "../store/sales.ts")).toBe(
      "domain/sale.ts → store/sales.ts: domain may not import store",
    );
    expect(fault("app/handlers.ts", "better-sqlite3")).toBe(
      "app/handlers.ts → better-sqlite3: the database stays in store",
    );
    expect(fault("screens/main.tsx", "node:fs")).toBe("screens/main.tsx → node:fs: screens may not use this package");
    expect(fault("shells/cli/main.ts", "../../store/openStore.ts")).toContain("a shell opens the store in one place");
    expect(fault("screens/sales/Register.tsx", "electron")).toContain("electron stays in shells/electron");
    expect(fault("valuation/buildUp.ts", "../hedonic/fit.ts")).toBeNull();
    expect(importsOf('import type { A } from "./a.ts";\nconst b = await import("./b.ts");\n// from "./c.ts"')).toEqual([
      "./a.ts",
      "./b.ts",
    ]);
  });

  test("no file holds a path of the machine it was written on", () => {
    const machine = /["'`(\s](\/work\/|\/tmp\/|\/root\/|\/home\/|\/Users\/|[A-Z]:\\\\)/;
    expect(files.filter((file) => machine.test(readFileSync(join(src, file), "utf8")))).toEqual([]);
  });
});

// What the binary exports: one line per file of operations. `memory` is exported by itself.
export * from "./diagnose";
export * from "./moments";
export * from "./reduce";
export * from "./refine";

/** First byte that is free for numbers, on a cache line. */
export function workspaceStart(): usize {
  return (__heap_base + 63) & ~63;
}

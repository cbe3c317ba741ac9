/**
 * All rows of a weighted, penalised least-squares problem reduced to a triangle that has the same solution: sequential
 * tall-skinny QR (Demmel, Grigori, Hoemmen & Langou 2012) over tiles of centred, scaled rows, then one tile for the penalties.
 * Symbols: z_ij = √w_i (x_ij − m_j)/c_j, the response last; R upper triangular with R′R = Z′Z + Λ.
 */
import type { Centring } from "./centring.ts";
import type { Column } from "./column.ts";
import { currentKernel } from "./kernels/currentKernel.ts";
import { blocksOf, COLUMN_BYTES, putBlock, putColumn } from "./kernels/designBlocks.ts";
import { TILE_ROWS } from "./kernels/layout.ts";

/** R, q × q row-major with q = columns + 1, upper part. `centring` speaks of the columns and the response. */
export function reduceRows(
  columns: readonly Column[],
  response: Float64Array,
  centring: Centring,
  weights: Float64Array | null,
  penalty: Float64Array | null,
): Float64Array {
  const kernel = currentKernel();
  const all: Column[] = [...columns, response];
  const q = all.length;
  const first = kernel.reserve(0);
  const factors = first + q * COLUMN_BYTES;
  const r = factors + COLUMN_BYTES;
  kernel.reserve(r + q * q * 8 - first);
  const { f64, operations } = kernel;
  f64.fill(0, r / 8, r / 8 + q * q);
  const roots = weights?.map(Math.sqrt) ?? null;
  for (const { start, size } of blocksOf(response.length)) {
    if (roots !== null) putBlock(f64, factors, roots, start, size);
    all.forEach((column, j) => {
      const at = first + j * COLUMN_BYTES;
      putColumn(f64, at, column, start, size);
      const { hi, lo } = centring.means[j]!;
      operations.centreColumn(at, size, hi, lo, 1 / centring.scales[j]!);
      if (roots !== null) operations.scaleRows(at, size, factors);
    });
    for (let row = 0; row < size; row += TILE_ROWS) {
      operations.foldTile(r, first + row * 8, q, Math.min(TILE_ROWS, size - row));
    }
  }
  if (penalty !== null) {
    for (let j = 0; j < q; j++) {
      const at = (first + j * COLUMN_BYTES) / 8;
      f64.fill(0, at, at + q + 1);
      if (j < penalty.length) f64[at + j] = Math.sqrt(penalty[j]!) / centring.scales[j]!;
    }
    operations.foldTile(r, first, q, q);
  }
  return f64.slice(r / 8, r / 8 + q * q);
}

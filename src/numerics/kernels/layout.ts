// Where the numbers of one block of rows lie in a kernel's memory. Read by TypeScript and by the assembly sources alike.

/** Rows that are shifted, scaled and summed together; chosen so that some thirty columns of a block stay in a core's own cache. */
export const BLOCK_ROWS = 4096;

/** Doubles from one column to the next: eight more than the rows, so that columns do not fall on the same cache sets. */
export const COLUMN_STRIDE = 4104;

/** Rows whose products are added up plainly before the sum goes, compensated, to the running total. */
export const TILE_ROWS = 256;

/** Columns that the register block of cross-products takes at a time, on each side. */
export const CROSS_WIDTH = 3;

/** Columns that the grouped sums take at a time. */
export const GROUP_WIDTH = 4;

/** The memory of a plain kernel: two views of the same bytes, replaced together when it grows. */
export interface PlainMemory {
  f64: Float64Array;
  u16: Uint16Array;
}

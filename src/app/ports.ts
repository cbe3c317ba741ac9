/** What the outside hands to the app: the store, the clock, digests and the log. Nothing in app/ reaches for them itself. */
import type { Day } from "../domain/day.ts";
import type { SheetFonts } from "../sheet/sheetFonts.ts";
import type { Store } from "../store/openStore.ts";

export type { SheetFonts } from "../sheet/sheetFonts.ts";

export interface Ports {
  readonly store: Store;
  /** Now as ISO 8601 in UTC, to the second: "2026-01-02T03:04:05Z". */
  nowUtc(): string;
  /** Today where the person is. */
  today(): Day;
  /** SHA-256 as 64 hexadecimal digits; text is taken as UTF-8. */
  sha256(data: Uint8Array | string): string;
  /** Where bugs go, whole. */
  log(cause: unknown): void;
  readonly programVersion: string;
  /** Bytes of the sheet's font files by face, read when a sheet is made. */
  readonly fonts: SheetFonts | Promise<SheetFonts>;
}

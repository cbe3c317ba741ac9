/** What every place works with: the open class, its model, the item being priced and the latest appraisal of both. */
import { createContext, useContext } from "react";
import type { Client } from "../../contract/client.ts";
import type { Appraisal, GlancedPrice, Range } from "../../domain/appraisal.ts";
import type { AssetClass, AssetClassSummary } from "../../domain/assetClass.ts";
import type { PlainError } from "../../domain/errors.ts";
import type { Edition, PriceModel } from "../../domain/priceModel.ts";
import type { Engagement, Subject } from "../../domain/subject.ts";

/**
 * saved: model and evidence are those of the edition; changed: they are not, or there is no edition yet;
 * refitting: an answer is awaited for longer than a blink; notPriced: the core refused, see `error`.
 */
export type Status = "saved" | "changed" | "refitting" | "notPriced";

/** The last move of the price, shown for a moment. */
export interface PriceMove {
  readonly from: number;
  readonly to: number;
  /** Ranges for one sale before the move, for the dashed bracket. */
  readonly fromRanges: readonly Range[];
  /** Typical error on a sale not yet seen, before the move. */
  readonly fromTypicalError: number | null;
}

export interface Workbench {
  readonly client: Client;
  readonly classes: readonly AssetClassSummary[];
  /** Null while no class is open: the start place is shown. */
  readonly classId: number | null;
  readonly assetClass: AssetClass | null;
  readonly summary: AssetClassSummary | null;
  /** The working model; null only while a class is being opened. */
  readonly model: PriceModel | null;
  readonly edition: Edition | null;
  /** Blank (no value known) until somebody describes an item. */
  readonly subject: Subject | null;
  readonly engagement: Engagement | null;
  /** Levels asked of the core, and the one that sentences and pictures speak of. */
  readonly levels: readonly number[];
  readonly level: number;
  /** The latest answer. It stays while a new one is awaited; null when there is none or the core refused. */
  readonly appraisal: Appraisal | null;
  readonly milliseconds: number | null;
  /** A price shown until the refined one comes (status refitting), never final; null else. */
  readonly glanced: GlancedPrice | null;
  readonly move: PriceMove | null;
  readonly status: Status;
  /** Why there is no price (status notPriced), or why the class could not be opened. */
  readonly error: PlainError | null;
  readonly canUndo: boolean;
  readonly canRedo: boolean;
  /** The key that the last change of the model left out, for "left out just now". */
  readonly leftOutJustNow: string | null;
  changeModel(change: (model: PriceModel) => PriceModel): void;
  /** Changes with the same `field` in a row are one step of undo. */
  changeSubject(change: (subject: Subject) => Subject, field?: string): void;
  changeEngagement(change: (engagement: Engagement) => Engagement): void;
  setLevel(level: number): void;
  undo(): void;
  redo(): void;
  /** Resolves to the edition; rejects with RequestRefused. */
  saveEdition(): Promise<Edition>;
  /** After any change of sales, attributes or sheets: counts, class and price are asked again. */
  reload(): Promise<void>;
  openClass(classId: number): Promise<void>;
}

export const WorkbenchContext = createContext<Workbench | null>(null);

export function useWorkbench(): Workbench {
  const workbench = useContext(WorkbenchContext);
  if (workbench === null) throw new Error("useWorkbench outside of the frame");
  return workbench;
}

/** What one attribute that is now left out would do, alone put into the set in use. Money per step at the average sale. */
export interface PuttingIn {
  readonly key: string;
  readonly label: string;
  /** Its own coefficients beside the set in use. */
  readonly own: readonly { readonly level: string | null; readonly stepWords: string; readonly money: number }[];
  /** How each coefficient in use would change, in the order of the ledger. */
  readonly changes: readonly {
    readonly attribute: string;
    readonly label: string;
    readonly level: string | null;
    readonly stepWords: string;
    readonly from: number;
    readonly to: number;
  }[];
  /** The item's price with it less the price now; null without an item, or where its value is not known. */
  readonly priceMove: number | null;
}

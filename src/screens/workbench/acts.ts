/** Acts that a place offers to "Find or do" while it is shown. */
import { createContext, useContext, useEffect } from "react";

export interface Act {
  readonly label: string;
  /** Key caps shown beside it: "Ctrl Z". */
  readonly keys?: string;
  run(): void;
}

export interface ActBook {
  /** Returns the way to take them back. */
  offer(acts: readonly Act[]): () => void;
}

export const ActBookContext = createContext<ActBook | null>(null);

/** Offers `acts` while the component is shown. Keep the array stable (useMemo) between renders. */
export function useActs(acts: readonly Act[]): void {
  const book = useContext(ActBookContext);
  useEffect(() => book?.offer(acts), [book, acts]);
}

/** The price, always on the table. */
import { useWorkbench } from "../workbench/workbench.ts";

export function PriceStrip() {
  const { status } = useWorkbench();
  return <footer aria-live="polite">{status}</footer>;
}

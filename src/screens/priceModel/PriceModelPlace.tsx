/** The price model. */
import { SectionHeading } from "../parts/index.ts";
import { useWorkbench } from "../workbench/workbench.ts";

export function PriceModelPlace() {
  const { assetClass } = useWorkbench();
  return <SectionHeading>Price model of {assetClass?.name ?? "no class yet"}</SectionHeading>;
}

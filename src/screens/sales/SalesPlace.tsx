/** The register of sales. */
import { SectionHeading } from "../parts/index.ts";
import { useWorkbench } from "../workbench/workbench.ts";

export function SalesPlace() {
  const { assetClass } = useWorkbench();
  return <SectionHeading>Sales of {assetClass?.name ?? "no class yet"}</SectionHeading>;
}

/** The attributes of the class. */
import { SectionHeading } from "../parts/index.ts";
import { useWorkbench } from "../workbench/workbench.ts";

export function AttributesPlace() {
  const { assetClass } = useWorkbench();
  return <SectionHeading>Attributes of {assetClass?.name ?? "no class yet"}</SectionHeading>;
}

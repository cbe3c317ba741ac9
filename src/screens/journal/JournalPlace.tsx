/** Every act, in order. */
import { SectionHeading } from "../parts/index.ts";
import { useWorkbench } from "../workbench/workbench.ts";

export function JournalPlace() {
  const { assetClass } = useWorkbench();
  return <SectionHeading>Journal of {assetClass?.name ?? "no class yet"}</SectionHeading>;
}

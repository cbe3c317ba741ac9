/** Sheets: drafts, issued, withdrawn. */
import { SectionHeading } from "../parts/index.ts";
import { useWorkbench } from "../workbench/workbench.ts";

export function SheetsPlace() {
  const { assetClass } = useWorkbench();
  return <SectionHeading>Sheets of {assetClass?.name ?? "no class yet"}</SectionHeading>;
}

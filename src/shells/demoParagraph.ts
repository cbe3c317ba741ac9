/** One short paragraph that shows the main job has run on the demo class. */
import { formatNumber } from "../domain/format.ts";
import type { DemoRun } from "./demoRun.ts";
import { priceSentence } from "./priceSentence.ts";

export function demoParagraph({ appraisal, edition }: DemoRun): string {
  const { evidence, assetClass, priced } = appraisal;
  const sales = `${formatNumber(evidence.read)} sales read, ${formatNumber(evidence.used)} of them evidence`;
  const first = `Demo class ${assetClass.name} (everything in it is invented): ${sales}, edition ${edition.number}.`;
  return priced === null ? first : `${first} ${priceSentence(priced, assetClass.currencyCode)}`;
}

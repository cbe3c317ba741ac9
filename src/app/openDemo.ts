/** The demo: invented classes, brought in through the same import as any file. Opening it again only finds it. */
import type { RequestOutput } from "../contract/requests.ts";
import type { NewAssetClass } from "../domain/assetClass.ts";
import type { ColumnMatch } from "../domain/importRecord.ts";
import { type DemoMarks, markDemoSales } from "./demo/markDemoSales.ts";
import { startClass } from "./importSales.ts";
import type { Ports } from "./ports.ts";

export interface DemoClass {
  readonly assetClass: NewAssetClass;
  readonly fileName: string;
  readonly bytes: Uint8Array;
  /** Without one the columns are matched by name. */
  readonly match?: ColumnMatch;
  /** What was done with the sales afterwards. */
  readonly marks?: DemoMarks;
}

/** Number of the first of `demos` (at least one). All classes are made, or none; one of the same name is left as it is. */
export function openDemo(ports: Ports, demos: readonly DemoClass[]): RequestOutput<"openDemo"> {
  const ids = ports.store.transaction(() =>
    demos.map(({ assetClass, fileName, bytes, match, marks }) => {
      const known = ports.store.assetClasses.findByName(assetClass.name);
      if (known !== null) return known;
      const { classId } = startClass(ports, assetClass, { fileName, bytes, options: null, match: match ?? null });
      if (marks !== undefined) markDemoSales(ports, classId, marks);
      return classId;
    }),
  );
  return { classId: ids[0]! };
}

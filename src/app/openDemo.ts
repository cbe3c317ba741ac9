/** The demo: invented classes, brought in through the same import as any file. Opening it again only finds it. */
import type { RequestOutput } from "../contract/requests.ts";
import type { NewAssetClass } from "../domain/assetClass.ts";
import { startClass } from "./importSales.ts";
import type { Ports } from "./ports.ts";

export interface DemoClass {
  readonly assetClass: NewAssetClass;
  readonly fileName: string;
  readonly bytes: Uint8Array;
}

/** Number of the first of `demos` (at least one). All classes are made, or none; one of the same name is left as it is. */
export function openDemo(ports: Ports, demos: readonly DemoClass[]): RequestOutput<"openDemo"> {
  const ids = ports.store.transaction(() =>
    demos.map(({ assetClass, fileName, bytes }) => {
      const known = ports.store.assetClasses.findByName(assetClass.name);
      if (known !== null) return known;
      return startClass(ports, assetClass, { fileName, bytes, options: null, match: null }).classId;
    }),
  );
  return { classId: ids[0]! };
}

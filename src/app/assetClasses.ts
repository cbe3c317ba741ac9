/** Requests about asset classes and their attributes. */
import type { RequestInput } from "../contract/requests.ts";
import type { AssetClass, AssetClassSummary } from "../domain/assetClass.ts";
import type { Ports } from "./ports.ts";
import { counted, recordAct } from "./recordAct.ts";

export function listClasses(ports: Ports): readonly AssetClassSummary[] {
  return ports.store.assetClasses.list();
}

export function describeClass(ports: Ports, { classId }: RequestInput<"describeClass">) {
  const { assetClasses } = ports.store;
  return { assetClass: assetClasses.get(classId), summary: assetClasses.summary(classId) };
}

export function createClass(ports: Ports, { assetClass }: RequestInput<"createClass">): AssetClass {
  return ports.store.transaction(() => {
    const made = ports.store.assetClasses.insert(assetClass);
    recordAct(ports, {
      act: "class-created",
      assetClassId: made.id,
      sentence: `Asset class ${made.name} created with ${counted(made.attributes.length, "attribute")}.`,
      facts: { name: made.name, attributes: made.attributes.map(({ key }) => key) },
    });
    return made;
  });
}

export function addAttribute(ports: Ports, { classId, attribute }: RequestInput<"addAttribute">): AssetClass {
  return ports.store.transaction(() => {
    ports.store.assetClasses.get(classId);
    ports.store.attributes.insert(classId, attribute);
    recordAct(ports, {
      act: "attribute-added",
      assetClassId: classId,
      sentence: `Attribute ${attribute.label} added.`,
      facts: { attribute },
    });
    return ports.store.assetClasses.get(classId);
  });
}

export function changeAttribute(ports: Ports, input: RequestInput<"changeAttribute">): AssetClass {
  const { classId, key, attribute } = input;
  return ports.store.transaction(() => {
    const before = ports.store.assetClasses.get(classId).attributes.find((each) => each.key === key);
    ports.store.attributes.change(classId, key, attribute);
    recordAct(ports, {
      act: "attribute-changed",
      assetClassId: classId,
      sentence: `Attribute ${before?.label ?? key} changed.`,
      facts: { before: before ?? null, after: attribute },
    });
    return ports.store.assetClasses.get(classId);
  });
}

export function archiveAttribute(ports: Ports, input: RequestInput<"archiveAttribute">): AssetClass {
  const { classId, key, archived } = input;
  return ports.store.transaction(() => {
    ports.store.attributes.archive(classId, key, archived);
    const assetClass = ports.store.assetClasses.get(classId);
    const label = assetClass.attributes.find((each) => each.key === key)?.label ?? key;
    recordAct(ports, {
      act: archived ? "attribute-archived" : "attribute-taken-back",
      assetClassId: classId,
      sentence: archived ? `Attribute ${label} archived; its values stay.` : `Attribute ${label} taken back into use.`,
      facts: { key },
    });
    return assetClass;
  });
}

/** What an import would do, without doing it. */
import type { ImportPreview, RequestInput } from "../contract/requests.ts";
import { fromBase64 } from "./base64.ts";
import { convertFile, NO_CLASS } from "./convertFile.ts";
import type { Ports } from "./ports.ts";

const SAMPLE = 30;

export function previewImport(ports: Ports, input: RequestInput<"previewImport">): ImportPreview {
  const assetClass = input.classId === null ? NO_CLASS : ports.store.assetClasses.get(input.classId);
  const { fileName, options, match } = input;
  const converted = convertFile(ports, assetClass, { fileName, bytes: fromBase64(input.bytesBase64), options, match });
  const { table, result } = converted;
  return {
    options: table.options,
    match: converted.match,
    headings: table.headings,
    sampleRows: table.rows.slice(0, SAMPLE),
    read: result.read,
    accepted: result.accepted.length,
    heldBack: result.heldBack,
    duplicates: result.duplicates,
    blankRows: result.blankRows,
    detected: [...table.detected, ...result.notes],
  };
}

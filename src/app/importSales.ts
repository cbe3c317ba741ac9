/**
 * Brings a file of sales in: converted first, then written whole (new attributes, levels, batch, sales with their verbatim
 * cells, held-back rows, duplicates, remembered match) in one transaction with its journal entry.
 */
import type { ImportOutcome, RequestInput } from "../contract/requests.ts";
import type { AssetClass, NewAssetClass } from "../domain/assetClass.ts";
import { AppError } from "../domain/errors.ts";
import type { ImportBatch } from "../domain/importRecord.ts";
import { fromBase64 } from "./base64.ts";
import { type ConvertedFile, convertFile, type FileToConvert } from "./convertFile.ts";
import { settle, unlistedLevels } from "./newAttributes.ts";
import type { Ports } from "./ports.ts";
import { counted, personOf, recordAct } from "./recordAct.ts";

/** "642 rows read: 633 brought in, 7 held back, 2 duplicates." */
export function importSentence(counts: Pick<ImportBatch, "read" | "accepted" | "heldBack" | "duplicates">): string {
  const duplicates = counted(counts.duplicates, "duplicate");
  return `${counted(counts.read, "row")} read: ${counts.accepted.toLocaleString("en-GB")} brought in, ${counts.heldBack.toLocaleString("en-GB")} held back, ${duplicates}.`;
}

/** New attributes with what their values say of them; levels that known choices gain. */
function writeAttributes(ports: Ports, assetClass: AssetClass, { fresh, result }: ConvertedFile): void {
  const sales = result.accepted.map(({ sale }) => sale);
  for (const attribute of fresh) ports.store.attributes.insert(assetClass.id, settle(attribute, sales));
  for (const attribute of assetClass.attributes) {
    if (attribute.kind !== "choice") continue;
    ports.store.attributes.addLevels(assetClass.id, attribute.key, unlistedLevels(attribute, sales));
  }
}

function writeBatch(ports: Ports, classId: number, file: FileToConvert, converted: ConvertedFile): ImportBatch {
  const { table, keyedMatch, result } = converted;
  return ports.store.batches.insert(
    {
      assetClassId: classId,
      fileName: file.fileName,
      fileDigest: ports.sha256(file.bytes),
      importedAtUtc: ports.nowUtc(),
      importedBy: personOf(ports),
      options: table.options,
      match: keyedMatch,
      headings: table.headings,
      read: result.read,
      accepted: result.accepted.length,
      heldBack: result.heldBack.length,
      duplicates: result.duplicates.length,
      blankRows: result.blankRows,
    },
    result.duplicates,
  );
}

function refuseLostRows({ result }: ConvertedFile): void {
  const told = result.accepted.length + result.heldBack.length + result.duplicates.length;
  if (told !== result.read) throw new Error(`${result.read} rows read, but ${told} accounted for`);
}

/** Writes inside the caller's transaction. */
export function writeImport(ports: Ports, assetClass: AssetClass, file: FileToConvert): ImportOutcome {
  const converted = convertFile(ports, assetClass, file);
  refuseLostRows(converted);
  const { table, result, keyedMatch } = converted;
  writeAttributes(ports, assetClass, converted);
  const batch = writeBatch(ports, assetClass.id, file, converted);
  const cellsByRow = new Map(table.rows.map(({ row, cells }) => [row, cells]));
  const incoming = result.accepted.map(({ row, sale }) => ({ row, sale, cells: cellsByRow.get(row) ?? null }));
  ports.store.sales.insertSales(assetClass.id, batch.id, incoming);
  ports.store.heldBack.insert(batch.id, result.heldBack);
  ports.store.columnMatches.remember(assetClass.id, table.headings, keyedMatch, batch.importedAtUtc);
  const sentence = importSentence(batch);
  recordAct(ports, {
    act: "sales-imported",
    assetClassId: assetClass.id,
    sentence: `${file.fileName}: ${sentence}`,
    facts: {
      batchId: batch.id,
      fileName: file.fileName,
      fileDigest: batch.fileDigest,
      read: batch.read,
      accepted: batch.accepted,
      heldBack: batch.heldBack,
      duplicates: batch.duplicates,
      newAttributes: converted.fresh.map(({ key }) => key),
    },
  });
  return { batch, sentence };
}

export function importSales(ports: Ports, input: RequestInput<"importSales">): ImportOutcome {
  const { fileName, options, match } = input;
  const file = { fileName, bytes: fromBase64(input.bytesBase64), options, match };
  return ports.store.transaction(() => writeImport(ports, ports.store.assetClasses.get(input.classId), file));
}

/** Makes a class and brings its first file in, both or neither. */
export function startClass(
  ports: Ports,
  assetClass: NewAssetClass,
  file: FileToConvert,
): ImportOutcome & { classId: number } {
  return ports.store.transaction(() => {
    const made = ports.store.assetClasses.insert(assetClass);
    recordAct(ports, {
      act: "class-created",
      assetClassId: made.id,
      sentence: `Asset class ${made.name} created for the sales of ${file.fileName}.`,
      facts: { name: made.name, fileName: file.fileName },
    });
    return { ...writeImport(ports, made, file), classId: made.id };
  });
}

/** Refuses (AppError) a file from which not one sale can be brought in: a class without sales is of no use. */
export function startClassFromFile(ports: Ports, input: RequestInput<"startClassFromFile">) {
  const { fileName, options, match, name, itemWord } = input;
  const { currencyCode, priceBasis } = match.fixed;
  const assetClass = { name, itemWord, currencyCode, priceBasis, invented: false, attributes: [] };
  const file = { fileName, bytes: fromBase64(input.bytesBase64), options, match };
  return ports.store.transaction(() => {
    const outcome = startClass(ports, assetClass, file);
    if (outcome.batch.accepted > 0) return outcome;
    throw new AppError({
      family: "import",
      code: "no-sales",
      what: `Not one of the ${counted(outcome.batch.read, "row")} could be read as a sale, so no class was made.`,
      where: fileName,
      whatToDo: "Look at the reasons in the preview, and change what the columns are or how the file is read.",
    });
  });
}

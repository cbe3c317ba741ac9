/**
 * A sheet's file laid beside the same sheet drawn anew. From the same version of the program both must be the same, object by
 * object, with streams unpacked (how tightly a stream is packed may differ from one machine to the next). From another version
 * only the figures in the text of the pages are compared, since words and places may have been bettered meanwhile.
 */
import { formatNumber } from "../../domain/format.ts";
import { plural } from "../figures.ts";
import { pageTexts } from "./pageText.ts";
import type { PdfFile, PdfObject } from "./pdfObjects.ts";

export interface PagesCompared {
  readonly textEqual: boolean;
  readonly problems: readonly string[];
}

export function comparePages(file: PdfFile, anew: PdfFile, sameVersion: boolean): PagesCompared {
  const [found, expected] = [pageTexts(file), pageTexts(anew)];
  if (!sameVersion) return compareFigures(found, expected);
  const problems: string[] = [];
  const page = differentPage(found, expected);
  if (page !== null) {
    problems.push(
      `The text of page ${page.number} is not what the embedded result gives: “${page.found}” stands where “${page.expected}” should.`,
    );
  }
  const parts = differentObjects(file, anew);
  if (parts > 0 && page === null) {
    problems.push(
      `${formatNumber(parts)} ${plural(parts, "part")} of the file ${plural(parts, "is", "are")} not as this program draws the embedded sheet.`,
    );
  }
  return { textEqual: page === null, problems };
}

interface DifferentPage {
  readonly number: number;
  readonly found: string;
  readonly expected: string;
}

function differentPage(found: readonly string[][], expected: readonly string[][]): DifferentPage | null {
  const count = Math.max(found.length, expected.length);
  for (let page = 0; page < count; page++) {
    const [left, right] = [found[page] ?? [], expected[page] ?? []];
    for (let k = 0; k < Math.max(left.length, right.length); k++) {
      if (left[k] !== right[k])
        return { number: page + 1, found: left[k] ?? "nothing", expected: right[k] ?? "nothing" };
    }
  }
  return null;
}

/** Figures of all pages in order, as printed. */
function figuresIn(pages: readonly string[][]): string[] {
  return pages.flatMap((page) => page.join(" ").match(/[\u2212+]?\d[\d.,]*\d|[\u2212+]?\d/g) ?? []);
}

function compareFigures(found: readonly string[][], expected: readonly string[][]): PagesCompared {
  const known = new Map<string, number>();
  for (const figure of figuresIn(expected)) known.set(figure, (known.get(figure) ?? 0) + 1);
  const strange = [...new Set(figuresIn(found))].filter((figure) => !known.has(figure));
  if (strange.length === 0) return { textEqual: true, problems: [] };
  const some = strange.slice(0, 3).join(", ");
  return {
    textEqual: false,
    problems: [
      `Figures stand on the pages that the embedded result does not give: ${some}${strange.length > 3 ? " and others" : ""}.`,
    ],
  };
}

/** The body without what may rightly differ: how long the packed stream is, and the digest of the whole. */
function settled({ body }: PdfObject): string {
  return body.replace(/\/Length \d+/, "/Length").replace(/(lotwright-seal\/1 sha256 )[0-9a-f]{64}/, "$1");
}

function sameObject(a: PdfObject | undefined, b: PdfObject | undefined): boolean {
  if (a === undefined || b === undefined || settled(a) !== settled(b)) return false;
  const [left, right] = [a.stream(), b.stream()];
  if (left === null || right === null) return left === right;
  return Buffer.compare(left, right) === 0;
}

function differentObjects(file: PdfFile, anew: PdfFile): number {
  const ids = new Set([...file.objects.keys(), ...anew.objects.keys()]);
  let count = file.trailer === anew.trailer ? 0 : 1;
  for (const id of ids) if (!sameObject(file.objects.get(id), anew.objects.get(id))) count += 1;
  return count;
}

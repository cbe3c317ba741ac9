import fc from "fast-check";
import { beforeAll, expect, test } from "vitest";
import { renderSheetPdf } from "../../src/sheet/renderSheetPdf.ts";
import { readSeal, sealPdf, UNSEALED } from "../../src/sheet/sealPdf.ts";
import { sheetEvidence } from "../fixtures/sheetEvidence.ts";
import { FONTS } from "./fonts.ts";

let bytes: Uint8Array;
beforeAll(async () => {
  bytes = await renderSheetPdf(sheetEvidence(), FONTS);
});

test("a sheet carries a digest of all its other bytes", () => {
  const seal = readSeal(bytes);
  expect(seal.intact).toBe(true);
  expect(seal.carried).toMatch(/^[0-9a-f]{64}$/);
  expect(sealPdf(bytes)).toEqual(bytes);
});

test("any one changed byte breaks the seal, wherever it is", () => {
  const { at } = readSeal(bytes);
  const places = fc.oneof(fc.nat(bytes.length - 1), fc.integer({ min: at! - 30, max: at! + 70 }));
  fc.assert(
    fc.property(places, fc.integer({ min: 1, max: 255 }), (place, by) => {
      const changed = Uint8Array.from(bytes);
      changed[place] = changed[place]! ^ by;
      expect(readSeal(changed).intact).toBe(false);
    }),
    { numRuns: 300 },
  );
});

test("bytes put before or after the file, or cut from it, break the seal", () => {
  const longer = new Uint8Array([...bytes, 10]);
  expect(readSeal(longer).intact).toBe(false);
  expect(readSeal(new Uint8Array([10, ...bytes])).intact).toBe(false);
  expect(readSeal(bytes.subarray(0, bytes.length - 1)).intact).toBe(false);
});

test("a digest in capitals is not the digest", () => {
  const { at, carried } = readSeal(bytes);
  const changed = Uint8Array.from(bytes);
  changed.set(Buffer.from(carried.toUpperCase(), "latin1"), at!);
  expect(readSeal(changed).intact).toBe(false);
});

test("two fields are as bad as none", () => {
  const field = Buffer.from(`x(${UNSEALED})y`);
  expect(readSeal(sealPdf(field)).intact).toBe(true);
  expect(() => sealPdf(Buffer.concat([field, field]))).toThrow("not exactly one place");
  expect(() => sealPdf(Buffer.from("nothing"))).toThrow("not exactly one place");
  expect(readSeal(Buffer.concat([field, field]))).toMatchObject({ at: null, intact: false });
});

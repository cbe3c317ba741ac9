import fc from "fast-check";
import { expect, test } from "vitest";
import { canonicalJson, parseCanonicalJson } from "../../src/sheet/canonicalJson.ts";

test("every double comes back to the last bit, minus zero and infinities too", () => {
  fc.assert(
    fc.property(fc.double(), (value) => {
      expect(Object.is(parseCanonicalJson(canonicalJson(value)), value)).toBe(true);
    }),
  );
  expect(canonicalJson([-0, Number.POSITIVE_INFINITY])).toBe('[-0,{"$number":"Infinity"}]');
});

test("plain values come back as they were, and give the same text again", () => {
  fc.assert(
    fc.property(fc.jsonValue(), (value) => {
      fc.pre(!/__proto__|constructor|prototype/.test(JSON.stringify(value)));
      const text = canonicalJson(value);
      expect(canonicalJson(parseCanonicalJson(text))).toBe(text);
    }),
  );
});

test("members that are undefined are left out and keys keep their order", () => {
  expect(canonicalJson({ b: 1, a: undefined, c: null })).toBe('{"b":1,"c":null}');
});

test("names that reach an object's own workings are refused", () => {
  for (const name of ["__proto__", "constructor", "prototype"]) {
    expect(() => parseCanonicalJson(`{"a":{"${name}":{"polluted":true}}}`)).toThrow(SyntaxError);
  }
  expect(({} as Record<string, unknown>).polluted).toBeUndefined();
});

/** What a forger would do: take a sheet apart, change objects, and write it again as a whole file with a fresh digest. */
import { deflateSync } from "node:zlib";
import { readPdf } from "../../src/sheet/read/pdfObjects.ts";
import { sealPdf } from "../../src/sheet/sealPdf.ts";

export interface Change {
  readonly body?: string;
  readonly data?: Uint8Array;
}

const latin1 = (text: string): Buffer => Buffer.from(text, "latin1");

/** `change` is asked for every object; null leaves it as it is. `compression` packs every stream anew. */
export function rebuild(
  bytes: Uint8Array,
  change: (id: number, body: string, data: Uint8Array | null) => Change | null,
  compression?: number,
): Uint8Array {
  const file = readPdf(bytes);
  const chunks: Buffer[] = [latin1("%PDF-1.7\n%\xff\xff\xff\xff\n")];
  const offsets = new Map<number, number>();
  const size = (): number => chunks.reduce((sum, chunk) => sum + chunk.length, 0);
  for (const [id, object] of file.objects) {
    const data = object.stream();
    const changed = change(id, object.body, data);
    let body = changed?.body ?? object.body;
    offsets.set(id, size());
    if (data === null) {
      chunks.push(latin1(`${id} 0 obj\n${body}\nendobj\n`));
      continue;
    }
    const plain = changed?.data ?? data;
    const packed = body.includes("/FlateDecode") ? deflateSync(plain, { level: compression ?? 6 }) : Buffer.from(plain);
    body = body.replace(/\/Length \d+/, `/Length ${packed.length}`);
    chunks.push(latin1(`${id} 0 obj\n${body}\nstream\n`), packed, latin1("\nendstream\nendobj\n"));
  }
  const start = size();
  const lines = [...file.objects.keys()]
    .sort((a, b) => a - b)
    .map((id) => `${String(offsets.get(id)).padStart(10, "0")} 00000 n \n`);
  chunks.push(
    latin1(
      `xref\n0 ${lines.length + 1}\n0000000000 65535 f \n${lines.join("")}trailer\n${file.trailer}\nstartxref\n${start}\n%%EOF\n`,
    ),
  );
  return sealPdf(new Uint8Array(Buffer.concat(chunks)));
}

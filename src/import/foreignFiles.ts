/** Files that are no text, told by their first bytes, and what a person can do about each. */

interface ForeignKind {
  readonly what: string;
  readonly whatToDo: string;
}

const SAVE_AS_CSV = "Open it in the program it was made with, save the sheet with the sales as CSV, and bring that in.";
const ASK_FOR_TABLE = "Ask for the list as a table (CSV), or type the sales into one.";

const KINDS: readonly (ForeignKind & { readonly starts: readonly number[] })[] = [
  { starts: [0x50, 0x4b, 0x03, 0x04], what: "a workbook or a ZIP archive", whatToDo: SAVE_AS_CSV },
  { starts: [0x50, 0x4b, 0x05, 0x06], what: "an empty ZIP archive", whatToDo: SAVE_AS_CSV },
  { starts: [0xd0, 0xcf, 0x11, 0xe0], what: "an older office document", whatToDo: SAVE_AS_CSV },
  { starts: [0x25, 0x50, 0x44, 0x46], what: "a PDF document", whatToDo: ASK_FOR_TABLE },
  { starts: [0x89, 0x50, 0x4e, 0x47], what: "a picture", whatToDo: ASK_FOR_TABLE },
  { starts: [0xff, 0xd8, 0xff], what: "a picture", whatToDo: ASK_FOR_TABLE },
  { starts: [0x47, 0x49, 0x46, 0x38], what: "a picture", whatToDo: ASK_FOR_TABLE },
  { starts: [0x49, 0x49, 0x2a, 0x00], what: "a picture", whatToDo: ASK_FOR_TABLE },
  { starts: [0x4d, 0x4d, 0x00, 0x2a], what: "a picture", whatToDo: ASK_FOR_TABLE },
  { starts: [0x52, 0x49, 0x46, 0x46], what: "a picture or a sound", whatToDo: ASK_FOR_TABLE },
  {
    starts: [0x1f, 0x8b],
    what: "a compressed file",
    whatToDo: "Unpack it first, and bring in the table that is in it.",
  },
  { starts: [0x37, 0x7a, 0xbc, 0xaf], what: "a compressed file", whatToDo: "Unpack it first, and bring in the table." },
  { starts: [0x53, 0x51, 0x4c, 0x69, 0x74, 0x65], what: "a database", whatToDo: SAVE_AS_CSV },
];

const UNKNOWN: ForeignKind = { what: "a file of unknown kind", whatToDo: SAVE_AS_CSV };

export function startsLikeForeignFile(bytes: Uint8Array): boolean {
  return KINDS.some(({ starts }) => starts.every((byte, at) => bytes[at] === byte));
}

export function kindOfForeignFile(bytes: Uint8Array): ForeignKind {
  return KINDS.find(({ starts }) => starts.every((byte, at) => bytes[at] === byte)) ?? UNKNOWN;
}

/** Fonts of a sheet: bytes of the font files by the file's name without its ending, as in resources/fonts. */
export type SheetFonts = Readonly<Record<string, Uint8Array>>;

/** One face: the file for Latin letters, and the one for the further Latin letters it falls back to. */
export interface Face {
  readonly latin: string;
  readonly further: string;
}

const face = (name: string, weight: string): Face => ({
  latin: `${name}-latin-${weight}`,
  further: `${name}-latin-ext-${weight}`,
});

export const FACES = {
  serif: face("source-serif-4", "400-normal"),
  serifItalic: face("source-serif-4", "400-italic"),
  serifBold: face("source-serif-4", "600-normal"),
  sans: face("ibm-plex-sans", "400-normal"),
  sansMedium: face("ibm-plex-sans", "500-normal"),
  sansBold: face("ibm-plex-sans", "600-normal"),
} as const;
export type FaceName = keyof typeof FACES;

/** Every file name (without ".woff") that a sheet needs. */
export const SHEET_FONT_FILES: readonly string[] = Object.values(FACES).flatMap(({ latin, further }) => [
  latin,
  further,
]);

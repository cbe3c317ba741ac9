/**
 * What only the window can do and no handler of the core: asked over the same bridge, answered by the Electron shell itself.
 * In a browser the page saves by a download and prints by its own menu, so it asks these only where `window.bridge` is.
 */
import { z } from "zod";

const pdf = z.object({ fileName: z.string().min(1).max(200), bytesBase64: z.string() });

export const shellRequestInputs = {
  /** Asks the person where to, and writes the file there; savedAs is null when they changed their mind. */
  saveFile: pdf,
  /** Shows the PDF in a window of its own with the print dialog. */
  printFile: pdf,
} as const;

export interface ShellRequestOutputs {
  saveFile: { savedAs: string | null };
  printFile: { shown: true };
}

export type ShellRequestName = keyof typeof shellRequestInputs;
export type ShellRequestInput<Name extends ShellRequestName> = z.infer<(typeof shellRequestInputs)[Name]>;

export function isShellRequestName(name: string): name is ShellRequestName {
  return Object.hasOwn(shellRequestInputs, name);
}

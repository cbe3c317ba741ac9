/**
 * Shows a sheet's PDF in a window of its own, from where it is printed: the print dialog comes up by itself, and the viewer's
 * own print button stays for later. The file lies in a temporary folder that goes when the window is closed.
 */
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { basename, join } from "node:path";
import { BrowserWindow } from "electron";
import type { ShellRequestInput, ShellRequestOutputs } from "../../contract/shellRequests.ts";

export async function printFile(input: ShellRequestInput<"printFile">): Promise<ShellRequestOutputs["printFile"]> {
  const folder = await mkdtemp(join(tmpdir(), "lotwright-print-"));
  const path = join(folder, basename(input.fileName.replaceAll("\\", "/")));
  await writeFile(path, Buffer.from(input.bytesBase64, "base64"));
  const window = new BrowserWindow({
    width: 900,
    height: 1100,
    title: input.fileName,
    autoHideMenuBar: true,
    webPreferences: { contextIsolation: true, sandbox: true, nodeIntegration: false, plugins: true, javascript: true },
  });
  window.once("closed", () => void rm(folder, { recursive: true, force: true }));
  await window.loadFile(path);
  window.webContents.print({ silent: false }, () => {});
  return { shown: true };
}

/** Asks where a file should go and writes it there. */
import { writeFile } from "node:fs/promises";
import { basename } from "node:path";
import { dialog } from "electron";
import type { ShellRequestInput, ShellRequestOutputs } from "../../contract/shellRequests.ts";

export async function saveFile(input: ShellRequestInput<"saveFile">): Promise<ShellRequestOutputs["saveFile"]> {
  const answer = await dialog.showSaveDialog({
    title: "Save the sheet",
    // Only a name: a page must not steer the dialog into a folder.
    defaultPath: basename(input.fileName.replaceAll("\\", "/")),
    filters: [{ name: "PDF", extensions: ["pdf"] }],
  });
  if (answer.canceled || answer.filePath === "") return { savedAs: null };
  await writeFile(answer.filePath, Buffer.from(input.bytesBase64, "base64"));
  return { savedAs: answer.filePath };
}

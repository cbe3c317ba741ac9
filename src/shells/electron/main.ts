/**
 * Entry of the window. Opened by plain Node it would only make the electron package fetch its binary, so that is refused here,
 * before anything of Electron is loaded.
 */
if (process.versions.electron === undefined) {
  process.stderr.write("This file is opened by Electron. Start Lotwright with npm start.\n");
  process.exit(2);
}
const { openApp } = await import("./openApp.ts");
await openApp();

export {};

/** The page's only door: a name and an input go out, a reply comes back. Nothing of Electron or Node reaches the page. */
import { contextBridge, ipcRenderer } from "electron";

contextBridge.exposeInMainWorld("bridge", {
  request: (name: string, input: unknown): Promise<unknown> => ipcRenderer.invoke("request", String(name), input),
});

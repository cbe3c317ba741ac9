/** Entry of the loopback shell: `node out/main/server.js [--store S] [--port N]`; serves until it is interrupted. */
import { requireNode } from "../nodeVersion.ts";

requireNode();
const { serveFromArguments } = await import("./serve.ts");
const { sumOnThreads } = await import("../sumOnThreads.ts");
sumOnThreads();
process.exitCode = await serveFromArguments(process.argv.slice(2));

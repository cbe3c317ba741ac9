/** Entry of `npm start`. The Node version is checked before anything else loads. */
import { requireNode } from "../nodeVersion.ts";

requireNode();
const { start } = await import("./start.ts");
process.exitCode = await start();

/** Entry of the command line: `npm run -s lotwright -- <verb> …`. The Node version is checked before anything else loads. */
import { requireNode } from "../nodeVersion.ts";

requireNode();
const { runCommand } = await import("./runCommand.ts");
const { sumOnThreads } = await import("../sumOnThreads.ts");
sumOnThreads();
process.exitCode = await runCommand(process.argv.slice(2));

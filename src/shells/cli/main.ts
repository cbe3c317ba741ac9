/** Entry of the command line: `npm run -s lotwright -- <verb> …`. The Node version is checked before anything else loads. */
import { requireNode } from "../nodeVersion.ts";

requireNode();
const { runCommand } = await import("./runCommand.ts");
process.exitCode = await runCommand(process.argv.slice(2));

import { openInNode } from "../../src/footage/node/index.ts";
import { decodeOnly, measureAll } from "./both-ways.ts";

const [what, path] = process.argv.slice(2) as [string, string];
const open = () => openInNode(path, {});
const timed = what === "decode" ? await decodeOnly(open) : await measureAll(open, "swim.mp4");
const peak_MB = process.resourceUsage().maxRSS / 1024;
process.stdout.write(JSON.stringify({ ...timed, peak_MB }));

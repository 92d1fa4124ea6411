#!/usr/bin/env node
// The command line's entry; what it does is in cli.ts.
import { launch } from "./launch.mjs";

await launch("cli.ts");

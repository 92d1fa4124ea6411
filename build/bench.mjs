#!/usr/bin/env node
// The benchmark's entry; what it does is in bench.ts.
import { launch } from "./launch.mjs";

await launch("bench.ts");

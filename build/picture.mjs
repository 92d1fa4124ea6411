// Makes the README's picture anew; what it does is in picture.ts.
import { launch } from "./launch.mjs";

await launch("picture.ts");

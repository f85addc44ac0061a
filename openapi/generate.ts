import { writeFileSync } from "node:fs";
import { operations } from "../server/routes/index.ts";
import { buildDocument } from "./build-document.ts";

const target = new URL("./openapi.json", import.meta.url);
writeFileSync(target, `${JSON.stringify(buildDocument(operations), null, 2)}\n`);
console.log(`Wrote openapi/openapi.json: ${operations.length} operations.`);

import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";

export interface XmlElement {
  readonly name: string;
  readonly namespace: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly text: string;
}

const script = fileURLToPath(new URL("read-xml.py", import.meta.url));

/**
 * The elements of XML documents in order, the root first, by Python's own parser.
 * @throws Error where one is not well-formed
 */
export function readXml(documents: readonly string[]): XmlElement[][] {
  const { status, stdout, stderr } = spawnSync("python3", [script], {
    input: JSON.stringify(documents),
    encoding: "utf8",
    maxBuffer: 1 << 28,
  });
  if (status !== 0) throw new Error(stderr);
  return JSON.parse(stdout) as XmlElement[][];
}

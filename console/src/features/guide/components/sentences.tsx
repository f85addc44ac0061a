import { Runs } from "../../../components/ui/markdown-view.tsx";
import { readRuns } from "../../../components/ui/read-markdown.ts";

/** Paragraphs whose words in backticks are code. */
export function Sentences({ lines }: { lines: readonly string[] }) {
  return (
    <div className="grid max-w-prose content-start gap-2">
      {lines.map((line) => (
        <p key={line} className="text-pretty">
          <Runs runs={readRuns(line)} />
        </p>
      ))}
    </div>
  );
}

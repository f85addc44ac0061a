import { readMarkdown, type Block, type Run } from "./read-markdown.ts";

/** A text in simple Markdown, its headings one level under the section's own. Its first heading is left to the page. */
export function MarkdownView({ text }: { text: string }) {
  const blocks = readMarkdown(text).filter((block) => block.kind !== "heading" || block.level > 1);
  return (
    <div className="grid max-w-prose gap-3">
      {blocks.map((block, index) => (
        <BlockView key={index} block={block} />
      ))}
    </div>
  );
}

function BlockView({ block }: { block: Block }) {
  switch (block.kind) {
    case "heading":
      return (
        <h3 className="mt-2 font-semibold">
          <Runs runs={block.runs} />
        </h3>
      );
    case "paragraph":
      return (
        <p>
          <Runs runs={block.runs} />
        </p>
      );
    case "list":
      return (
        <ul className="grid gap-2">
          {block.items.map((runs, index) => (
            <li key={index} className="border-l border-rule pl-3">
              <Runs runs={runs} />
            </li>
          ))}
        </ul>
      );
  }
}

/** One line of it: strong words and code among plain ones. */
export function Runs({ runs }: { runs: readonly Run[] }) {
  return runs.map((run, index) => {
    if (run.kind === "strong")
      return (
        <strong key={index} className="font-semibold">
          {run.text}
        </strong>
      );
    return run.kind === "code" ? (
      <code key={index} className="border border-hair bg-well px-1 wrap-anywhere">
        {run.text}
      </code>
    ) : (
      <span key={index}>{run.text}</span>
    );
  });
}

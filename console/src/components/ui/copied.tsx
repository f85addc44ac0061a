import { CopyButton } from "./copy-button.tsx";

/** A long id or hash in a title block, with its copy button. */
export function Copied({ text, what }: { text: string; what: string }) {
  return (
    <span className="flex items-start justify-between gap-2">
      <span className="min-w-0 text-xs leading-5 break-all">{text}</span>
      <CopyButton text={text} what={what} />
    </span>
  );
}

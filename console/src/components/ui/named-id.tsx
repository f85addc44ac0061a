import { Link } from "react-router-dom";
import { CopyButton } from "./copy-button.tsx";

/** A thing by its name, which leads to it, and by its id, which can be copied. */
export function NamedId({ name, id, path }: { name: string; id: string; path: string }) {
  return (
    <>
      <Link to={path} className="link font-semibold break-words">
        {name}
      </Link>
      <span className="flex items-center gap-2 text-xs text-muted">
        <span className="break-all">{id}</span>
        <CopyButton text={id} what={`id ${id}`} />
      </span>
    </>
  );
}

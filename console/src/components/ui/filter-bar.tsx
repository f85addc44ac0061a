import type { ReactNode, SubmitEvent } from "react";
import { useNavigate } from "react-router-dom";
import { addressOf } from "../../lib/address-of.ts";
import { textOf } from "../../lib/read-form.ts";
import { Button, ButtonLink } from "./button.tsx";

interface FilterBarProps {
  label: string;
  path: string;
  search: URLSearchParams;
  names: readonly string[];
  children: ReactNode;
}

/** What is asked for stands in the address: it can be kept, sent on, and gone back to. */
export function FilterBar({ label, path, search, names, children }: FilterBarProps) {
  const navigate = useNavigate();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    const data = new FormData(event.currentTarget);
    const chosen = names.map((name) => [name, textOf(data, name).trim()]).filter(([, value]) => value !== "");
    void navigate(addressOf(path, new URLSearchParams(chosen)));
  };
  return (
    <form
      // A new address fills the form anew: the back button brings its filters back too.
      key={search.toString()}
      onSubmit={submit}
      role="search"
      aria-label={label}
      className="no-print mb-6 grid grid-cols-2 items-end gap-3 border-y border-hair py-4 sm:grid-cols-4"
    >
      {children}
      <div className="col-span-2 flex flex-wrap gap-2 sm:col-span-1">
        <Button type="submit" className="min-h-10">
          Apply filters
        </Button>
        {names.some((name) => search.has(name)) && (
          <ButtonLink to={path} className="min-h-10">
            Clear
          </ButtonLink>
        )}
      </div>
    </form>
  );
}

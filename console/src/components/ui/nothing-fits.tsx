import { ButtonLink } from "./button.tsx";
import { Empty } from "./empty.tsx";

interface NothingFitsProps {
  /** One of what is listed: "job". */
  what: string;
  /** The list without filters, and what it shows then: "all". */
  path: string;
  shows: string;
}

/** A list is empty because of its filters. */
export function NothingFits({ what, path, shows }: NothingFitsProps) {
  return (
    <Empty title={`No ${what} fits these filters`}>
      Widen them, or clear them to see {shows}.
      <p className="mt-4">
        <ButtonLink to={path}>Clear filters</ButtonLink>
      </p>
    </Empty>
  );
}

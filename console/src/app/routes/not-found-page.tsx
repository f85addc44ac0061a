import { ButtonLink } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { paths } from "../../config/paths.ts";

export function NotFoundPage() {
  return (
    <>
      <PageHeading title="Not found" />
      <Empty title="There is no page at this address">
        It may be cut short, or come from another version of the console.
        <p className="mt-4">
          <ButtonLink to={paths.calculations}>See all calculations</ButtonLink>
        </p>
      </Empty>
    </>
  );
}

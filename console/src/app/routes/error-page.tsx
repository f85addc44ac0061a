import { isRouteErrorResponse, useRouteError } from "react-router-dom";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { NotFoundPage } from "./not-found-page.tsx";

/** A page that failed to load or to draw: header, navigation and cautions stay. */
export function ErrorPage() {
  const error = useRouteError();
  if (isRouteErrorResponse(error) && error.status === 404) return <NotFoundPage />;
  return (
    <>
      <PageHeading title="This page failed" />
      <Failure error={error} what="The page could not be shown." onRetry={() => location.reload()} />
    </>
  );
}

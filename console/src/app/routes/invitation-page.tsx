import { useLocation } from "react-router-dom";
import { ButtonLink } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { paths } from "../../config/paths.ts";
import { AcceptInvitationForm } from "../../features/session/components/accept-invitation-form.tsx";

/** Where an invitation's link leads. Its token stands after the #, which browsers send to nobody. */
export function InvitationPage() {
  const { hash } = useLocation();
  const token = new URLSearchParams(hash.slice(1)).get("token") ?? "";
  return (
    <div className="mx-auto max-w-md py-4 md:py-12">
      <PageHeading title="Accept your invitation" lead="Choose a password. The link can be used once." />
      {token === "" ? (
        <Empty title="This link is not whole">
          Open it as it was sent, with everything after the #, or ask your administrator for a new one.
          <p className="mt-4">
            <ButtonLink to={paths.signIn}>Go to sign in</ButtonLink>
          </p>
        </Empty>
      ) : (
        <AcceptInvitationForm key={token} token={token} />
      )}
    </div>
  );
}

import { useMutation } from "@tanstack/react-query";
import { useState, type SubmitEvent } from "react";
import { acceptInvitationRequest } from "../../../../../shared/schemas/sessions.ts";
import { Button, ButtonLink } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { paths } from "../../../config/paths.ts";
import { checkForm, faultsOfProblem, textOf, type FieldFaults } from "../../../lib/read-form.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";
import { acceptInvitation, type Acceptance } from "../api/accept-invitation.ts";

/** The link is used up by this form's button and by nothing else: opening the page changes nothing. */
export function AcceptInvitationForm({ token }: { token: string }) {
  const [faults, setFaults] = useState<FieldFaults>({});
  const attempt = useAttemptKey();
  const mutation = useMutation({
    mutationFn: (acceptance: Acceptance) =>
      acceptInvitation(acceptance, attempt.keyFor(JSON.stringify(acceptance))),
    onSettled: (_, error) => attempt.settle(error ?? undefined),
    onError: (error) => setFaults(faultsOfProblem(error)),
  });
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (mutation.isPending) return;
    const data = new FormData(event.currentTarget);
    const name = textOf(data, "name").trim();
    const checked = checkForm(acceptInvitationRequest, {
      token,
      password: textOf(data, "password"),
      ...(name === "" ? {} : { name }),
    });
    setFaults(checked.faults ? { password: "Choose a password of at least 12 characters." } : {});
    if (checked.values) mutation.mutate(checked.values);
  };
  if (mutation.isSuccess) {
    return (
      <div role="status">
        <p className="mb-4">
          Your password is set. Sign in with the e-mail that the invitation was made for.
        </p>
        <ButtonLink look="main" to={paths.signIn}>
          Go to sign in
        </ButtonLink>
      </div>
    );
  }
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <Field label="Your name" hint="Leave empty to keep the name on the invitation." error={faults["name"]}>
        {(attributes) => (
          <input {...attributes} name="name" autoComplete="name" className="control" maxLength={120} />
        )}
      </Field>
      <Field
        label="New password"
        hint="At least 12 characters. Any characters; length is what counts."
        error={faults["password"]}
      >
        {(attributes) => (
          <input
            {...attributes}
            name="password"
            type="password"
            autoComplete="new-password"
            className="control"
            autoFocus
          />
        )}
      </Field>
      {mutation.isError && <Failure error={mutation.error} what="The invitation was not accepted." />}
      <Button type="submit" look="main" busy={mutation.isPending}>
        Accept invitation
      </Button>
    </form>
  );
}

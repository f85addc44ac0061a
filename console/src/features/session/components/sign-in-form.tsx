import { useMutation } from "@tanstack/react-query";
import { useState, type SubmitEvent } from "react";
import { createSessionRequest } from "../../../../../shared/schemas/sessions.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { checkForm, textOf, type FieldFaults } from "../../../lib/read-form.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import type { Member } from "../../../lib/session-store.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";
import { signIn, type Credentials } from "../api/sign-in.ts";

interface SignInFormProps {
  /** Filled in for a member whose session ran out. */
  email?: string | undefined;
  onSignedIn: (member: Member) => void;
}

export function SignInForm({ email = "", onSignedIn }: SignInFormProps) {
  const [faults, setFaults] = useState<FieldFaults>({});
  const attempt = useAttemptKey();
  const mutation = useMutation({
    mutationFn: (credentials: Credentials) => openOnce(credentials, attempt),
    onSuccess: onSignedIn,
  });
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (mutation.isPending) return;
    const data = new FormData(event.currentTarget);
    const checked = checkForm(createSessionRequest, {
      email: textOf(data, "email").trim(),
      password: textOf(data, "password"),
    });
    setFaults(wordsFor(checked.faults ?? {}));
    if (checked.values) mutation.mutate(checked.values);
  };
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <Field label="E-mail" error={faults["email"]}>
        {(attributes) => (
          <input
            {...attributes}
            name="email"
            type="email"
            autoComplete="username"
            defaultValue={email}
            className="control"
            autoFocus={email === ""}
          />
        )}
      </Field>
      <Field label="Password" error={faults["password"]}>
        {(attributes) => (
          <input
            {...attributes}
            name="password"
            type="password"
            autoComplete="current-password"
            className="control"
            autoFocus={email !== ""}
            data-first-focus={email === "" ? undefined : ""}
          />
        )}
      </Field>
      {mutation.isError && <Failure error={mutation.error} what="You are not signed in." />}
      <Button type="submit" look="main" busy={mutation.isPending}>
        Sign in
      </Button>
    </form>
  );
}

function wordsFor(faults: FieldFaults): FieldFaults {
  return {
    ...("email" in faults ? { email: "An e-mail address is needed, as name@example.com." } : {}),
    ...("password" in faults ? { password: "The password is needed." } : {}),
  };
}

/** A sign-in whose answer was lost cannot be shown again: the same credentials then open another session. */
async function openOnce(
  credentials: Credentials,
  attempt: ReturnType<typeof useAttemptKey>,
): Promise<Member> {
  const body = JSON.stringify(credentials);
  try {
    const member = await signIn(credentials, attempt.keyFor(body));
    attempt.settle();
    return member;
  } catch (error) {
    attempt.settle(error);
    if (!(error instanceof ProblemError) || error.problem.code !== "secret_already_shown") throw error;
    return signIn(credentials, attempt.keyFor(body));
  }
}

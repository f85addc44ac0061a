import type { UseMutationResult } from "@tanstack/react-query";
import { useState, type SubmitEvent } from "react";
import type { z } from "zod";
import { checkForm, faultsOfProblem, type FieldFaults } from "./read-form.ts";

interface OrderForm<Schema extends z.ZodType, Made> {
  schema: Schema;
  /** What the form says, as the service will be asked. */
  read: (data: FormData) => unknown;
  /** Our own words for the faults of the fields that are named; others are left out. */
  wordsFor: (faults: FieldFaults) => FieldFaults;
  create: Pick<UseMutationResult<Made, Error, z.infer<Schema>>, "mutate" | "isPending">;
  onMade: (made: Made) => void;
}

/** Checks a form when it is sent, orders what it says once, and holds what is wrong with its fields. */
export function useOrderForm<Schema extends z.ZodType, Made>(
  form: OrderForm<Schema, Made>,
): {
  faults: FieldFaults;
  submit: (event: SubmitEvent<HTMLFormElement>) => void;
} {
  const [faults, setFaults] = useState<FieldFaults>({});
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (form.create.isPending) return;
    const checked = checkForm(form.schema, form.read(new FormData(event.currentTarget)));
    setFaults(form.wordsFor(checked.faults ?? {}));
    if (checked.values === null) return;
    form.create.mutate(checked.values, {
      onSuccess: form.onMade,
      onError: (error) => setFaults(faultsOfProblem(error)),
    });
  };
  return { faults, submit };
}

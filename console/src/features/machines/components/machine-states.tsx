import type { UseQueryResult } from "@tanstack/react-query";
import type { ReactNode } from "react";
import type { Machine } from "../../../../../shared/schemas/machines.ts";
import { ButtonLink } from "../../../components/ui/button.tsx";
import { Empty } from "../../../components/ui/empty.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { paths } from "../../../config/paths.ts";
import { ProblemError } from "../../../lib/service-error.ts";

interface MachineStatesProps {
  machine: UseQueryResult<Machine>;
  children: (machine: Machine) => ReactNode;
}

/** A machine that is being read, absent, failed or there. A later failure leaves it there: forms hold what was typed. */
export function MachineStates({ machine, children }: MachineStatesProps) {
  const isAbsent = machine.error instanceof ProblemError && machine.error.problem.status === 404;
  if (isAbsent) {
    return (
      <Empty title="There is no machine with this id">
        It may belong to another organisation, or the id is cut short.
        <p className="mt-4">
          <ButtonLink to={paths.machines}>See all machines</ButtonLink>
        </p>
      </Empty>
    );
  }
  return (
    <>
      {machine.isError && (
        <div className="mb-6">
          <Failure
            error={machine.error}
            what="The machine could not be read."
            onRetry={() => void machine.refetch()}
          />
        </div>
      )}
      {machine.data
        ? children(machine.data)
        : machine.isPending && <Skeleton what="the machine" lines={12} />}
    </>
  );
}

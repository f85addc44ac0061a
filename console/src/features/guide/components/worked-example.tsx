import { Link } from "react-router-dom";
import { Empty } from "../../../components/ui/empty.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { computations, paths } from "../../../config/paths.ts";
import { useMay } from "../../../lib/use-session.ts";
import { useWorkedExample, type AlignmentExample } from "../api/get-worked-example.ts";
import { followExample } from "../worked/follow-example.ts";
import { ExampleMoves } from "./example-moves.tsx";
import { ExampleSurvey } from "./example-survey.tsx";
import { Sentences } from "./sentences.tsx";

/** The documented call of the whole chain, followed by hand: every number here is worked from those answered. */
export function WorkedExample() {
  const example = useWorkedExample();
  if (example.isPending) return <Skeleton what="the example" lines={12} />;
  if (example.isError) {
    return (
      <Failure
        error={example.error}
        what="The example could not be read."
        onRetry={() => void example.refetch()}
      />
    );
  }
  return <Followed example={example.data} />;
}

function Followed({ example }: { example: AlignmentExample | null }) {
  const followed = example && followExample(example);
  if (!followed) {
    return (
      <Empty title="The documents have no example that can be followed">
        They may be of another version than this console.
      </Empty>
    );
  }
  return (
    <>
      <Sentences lines={opening(followed.stationId)} />
      <TryIt />
      <ExampleSurvey example={example} followed={followed} />
      <ExampleMoves example={example} followed={followed} />
    </>
  );
}

function opening(stationId: string): string[] {
  return [
    "The call and its answer are those of the documents, computed by the engine that serves them; nothing below is typed. Each table puts the numbers that were answered into the formula of the guide, and shows what that comes to beside what the service answered.",
    `It follows ${stationId}, the station that uses most of its tolerance, from its readings to its shims.`,
  ];
}

function TryIt() {
  if (!useMay("calculations:write")) return null;
  return (
    <p>
      <Link className="link" to={`${paths.tryCall}?endpoint=${computations.alignment.resource}`}>
        Try this call
      </Link>{" "}
      yourself, or change a reading in it and see what follows.
    </p>
  );
}

import { useEffect } from "react";
import { useLocation } from "react-router-dom";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Empty } from "../../../components/ui/empty.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { useProblems } from "../api/get-problems.ts";
import { Sentences } from "./sentences.tsx";

/** Every problem code as the service itself lists it. */
export function Codes() {
  const problems = useProblems();
  if (problems.isPending) return <Skeleton what="the codes" lines={12} />;
  if (problems.isError) {
    return (
      <Failure
        error={problems.error}
        what="The codes could not be read."
        onRetry={() => void problems.refetch()}
      />
    );
  }
  if (problems.data.length === 0) {
    return <Empty title="The service lists no codes">It may be of another version than this console.</Empty>;
  }
  return <CodeTables kinds={problems.data} />;
}

type Kind = NonNullable<ReturnType<typeof useProblems>["data"]>[number];

function CodeTables({ kinds }: { kinds: readonly Kind[] }) {
  useArrivalAtHash();
  const ordered = [...kinds].sort((a, b) => a.status - b.status);
  return (
    <>
      <Sentences lines={codesSay} />
      <DataTable caption="Problem codes" columns={columns} rows={ordered} rowKey={({ code }) => code} />
    </>
  );
}

/** The address may name a code; its row is there only now. */
function useArrivalAtHash(): void {
  const { hash } = useLocation();
  useEffect(() => {
    if (hash !== "") document.getElementById(hash.slice(1))?.scrollIntoView();
  }, [hash]);
}

const columns: DataColumn<Kind>[] = [
  {
    heading: "code",
    lead: true,
    cell: ({ code }) => (
      <a id={code} className="link max-lg:break-all lg:whitespace-nowrap" href={apiPaths.problem(code)}>
        <code>{code}</code>
      </a>
    ),
  },
  { heading: "status", cell: ({ status }) => status },
  { heading: "means", cell: ({ title }) => title },
  { heading: "do", cell: ({ fix }) => fix },
];

const codesSay: readonly string[] = [
  "Every refusal is an RFC 9457 problem: `type`, `title`, `status`, `detail`, `code`, `requestId` and what to do. Bad input names every fault, not the first, each with an RFC 6901 pointer into the body, the value sent, its unit and what is allowed. A code keeps its meaning: programs read `code`, people read `detail`.",
];

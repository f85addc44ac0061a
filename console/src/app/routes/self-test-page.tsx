import { Button } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { Instant } from "../../components/ui/instant.tsx";
import { MarkdownView } from "../../components/ui/markdown-view.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { SectionHeading } from "../../components/ui/section-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { useMeta } from "../../features/meta/api/get-meta.ts";
import { useSelfTest } from "../../features/self-test/api/get-self-test.ts";
import { SelfTestTable, Tally } from "../../features/self-test/components/self-test-table.tsx";

/** Whether the engine that answers here gives what is in print, and what changed in it. */
export function SelfTestPage() {
  const test = useSelfTest();
  return (
    <>
      <PageHeading
        title="Self-test"
        lead="Published worked examples, computed anew by the engine that answers here, each printed figure held against what comes out."
      >
        {test.isSuccess && (
          <Button busy={test.isFetching} onClick={() => void test.refetch()}>
            Run self-test again
          </Button>
        )}
      </PageHeading>
      <div className="sheet-stack">
        <Outcome test={test} />
        <EngineChanges />
      </div>
    </>
  );
}

function Outcome({ test }: { test: ReturnType<typeof useSelfTest> }) {
  if (test.isPending) return <Skeleton what="the self-test" lines={12} />;
  // What an earlier run found says nothing of an engine that no longer answers.
  if (test.isError) {
    return (
      <Failure
        error={test.error}
        what="The self-test could not be run."
        onRetry={() => void test.refetch()}
      />
    );
  }
  const { figures, passed, failed, at, engineVersion } = test.data;
  if (figures.length === 0) {
    return (
      <Empty title="This engine ships no cases">
        Nothing was held against print, so nothing is proved. Tell whoever runs the service.
      </Empty>
    );
  }
  return (
    <div className="sheet-stack" aria-busy={test.isFetching}>
      <p role="status">
        Engine {engineVersion}: <Tally passed={passed} failed={failed} />, run <Instant at={at} />.
        {failed > 0 && (
          <span className="mt-1 block text-signal">
            Do not use its answers in the areas that failed. Tell whoever runs the service.
          </span>
        )}
      </p>
      <SelfTestTable figures={figures} />
    </div>
  );
}

function EngineChanges() {
  const meta = useMeta();
  return (
    <section aria-label="Engine">
      <SectionHeading>{meta.isSuccess ? `Engine ${meta.data.engineVersion}` : "Engine"}</SectionHeading>
      {meta.isPending ? (
        <Skeleton what="what changed in the engine" />
      ) : meta.isError ? (
        <Failure
          error={meta.error}
          what="What changed in the engine could not be read."
          onRetry={() => void meta.refetch()}
        />
      ) : (
        <MarkdownView text={meta.data.engineChangelog} />
      )}
    </section>
  );
}

import { Breadcrumb } from "../../components/ui/breadcrumb.tsx";
import { Disclosure } from "../../components/ui/disclosure.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { paths, serverPaths } from "../../config/paths.ts";
import { ImportWorkbook } from "../../features/machines/components/import-workbook.tsx";
import { NewMachineForm } from "../../features/machines/components/new-machine-form.tsx";
import { useMay } from "../../lib/use-session.ts";

export function NewMachinePage() {
  const mayWrite = useMay("machines:write");
  return (
    <>
      <Breadcrumb steps={[{ to: paths.machines, words: "Machines" }]} />
      <PageHeading
        title="Describe a machine"
        lead={
          <>
            Every member of the document is explained in{" "}
            <a className="link" href={serverPaths.docs}>
              the documents
            </a>
            .
          </>
        }
      />
      {mayWrite ? (
        <div className="grid gap-6">
          <Disclosure title="From a workbook">
            <ImportWorkbook />
          </Disclosure>
          <NewMachineForm />
        </div>
      ) : (
        <Empty title="Your role reads machines">Engineers and administrators describe them.</Empty>
      )}
    </>
  );
}

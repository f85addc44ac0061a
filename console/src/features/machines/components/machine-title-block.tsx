import type { Machine, MachineRevision } from "../../../../../shared/schemas/machines.ts";
import { Copied } from "../../../components/ui/copied.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { TitleBlock } from "../../../components/ui/title-block.tsx";
import { authorName } from "../../jobs/components/job-words.ts";

interface MachineTitleBlockProps {
  machine: Machine;
  /** The revision shown, where it is not the newest. */
  revision: MachineRevision | null;
  organisation: string;
}

/** The fields that ISO 7200 names, of the revision shown. */
export function MachineTitleBlock({ machine, revision, organisation }: MachineTitleBlockProps) {
  const { document, documentHash } = revision ?? machine;
  return (
    <TitleBlock
      label="Title block"
      fields={[
        { name: "legal owner", value: document.owner ?? organisation },
        { name: "title", value: document.name, span: 2 },
        { name: "document type", value: "machine description" },
        { name: "identification number", value: <Copied text={machine.id} what="machine id" />, span: 2 },
        { name: "revision", value: String(revision?.revision ?? machine.revision) },
        { name: "date of issue", value: <Instant at={revision?.createdAt ?? machine.createdAt} /> },
        { name: "creator", value: revision ? authorName(revision.by) : "see the revisions", span: 2 },
        { name: "approval person", value: <span className="text-muted">not approved</span> },
        { name: "sheet", value: "1 / 1" },
        { name: "document hash", value: <Copied text={documentHash} what="document hash" />, span: 4 },
      ]}
    />
  );
}

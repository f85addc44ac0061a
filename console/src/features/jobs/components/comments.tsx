import { commentRequest } from "../../../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { TextAreaField } from "../../../components/ui/text-field.tsx";
import { textOf } from "../../../lib/read-form.ts";
import { EntryForm } from "./entry-form.tsx";
import { authorName } from "./job-words.ts";

export function Comments({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  return (
    <section id="comments" aria-label="Comments" className="sheet-stack">
      <SectionHeading>Comments</SectionHeading>
      {record.comments.length === 0 ? (
        <p className="text-muted">None.</p>
      ) : (
        <ul className="grid gap-3">
          {record.comments.map(({ id, text, author, createdAt }) => (
            <li key={id} className="max-w-prose border-l border-rule pl-3">
              <p className="break-words whitespace-pre-line">{text}</p>
              <p className="text-xs text-muted">
                {authorName(author)}, <Instant at={createdAt} />
              </p>
            </li>
          ))}
        </ul>
      )}
      {mayAct && (
        <Disclosure title="Add a comment">
          <EntryForm
            job={record.id}
            part="comments"
            schema={commentRequest}
            read={(data) => ({ text: textOf(data, "text") })}
            fields={["/text"]}
            button="Add comment"
            failed="The comment was not added."
          >
            {(fault) => <TextAreaField label="Comment" name="text" error={fault("/text")} />}
          </EntryForm>
        </Disclosure>
      )}
    </section>
  );
}

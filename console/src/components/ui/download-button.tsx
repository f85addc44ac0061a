import { useMutation } from "@tanstack/react-query";
import { fetchFileAsMember } from "../../lib/call-api.ts";
import { saveFile } from "../../lib/save-file.ts";
import { Button } from "./button.tsx";
import { Failure } from "./failure.tsx";

interface DownloadButtonProps {
  path: string;
  /** What it is saved as. */
  fileName: string;
  children: string;
  /** What is saved, for who hears several buttons of one name. */
  label?: string;
}

/** Fetches a file in the member's name and hands it to the browser. */
export function DownloadButton({ path, fileName, children, label }: DownloadButtonProps) {
  const download = useMutation({
    mutationFn: async () => saveFile(await fetchFileAsMember({ method: "GET", path }), fileName),
  });
  return (
    <span className="inline-grid gap-2">
      <Button busy={download.isPending} aria-label={label} onClick={() => download.mutate()}>
        {children}
      </Button>
      {download.isError && <Failure error={download.error} what="The file could not be fetched." />}
    </span>
  );
}

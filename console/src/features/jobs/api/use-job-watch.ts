import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useState, useSyncExternalStore } from "react";
import { JobWatch, type Watched } from "./job-watch.ts";
import { jobsKey } from "./list-jobs.ts";

/** A job's events on this page, from when they are asked for until the page is left. */
export function useJobWatch(job: string): Watched & Pick<JobWatch, "start" | "stop" | "add"> {
  const queryClient = useQueryClient();
  const [watch] = useState(
    () =>
      new JobWatch(job, () => void queryClient.invalidateQueries({ queryKey: [...jobsKey, "record", job] })),
  );
  useEffect(() => watch.stop, [watch]);
  const { start, stop, add } = watch;
  return { ...useSyncExternalStore(watch.subscribe, watch.read), start, stop, add };
}

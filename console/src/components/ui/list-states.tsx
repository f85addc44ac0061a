import type { UseQueryResult } from "@tanstack/react-query";
import type { ReactNode } from "react";
import { addressOf } from "../../lib/address-of.ts";
import { Failure } from "./failure.tsx";
import { Pager } from "./pager.tsx";
import { Skeleton } from "./skeleton.tsx";

interface Page<Item> {
  readonly data: readonly Item[];
  readonly nextCursor: string | null;
}

interface ListStatesProps<Item> {
  list: UseQueryResult<Page<Item>>;
  /** As in "Reading the jobs" and "The jobs could not be read." */
  what: string;
  /** The page's address without a query, and its query. */
  path: string;
  search: URLSearchParams;
  empty: ReactNode;
  children: (items: readonly Item[]) => ReactNode;
}

/** A list that is being read, failed, empty or full, with the way to its other pages. */
export function ListStates<Item>({ list, what, path, search, empty, children }: ListStatesProps<Item>) {
  if (list.isPending) return <Skeleton what={what} lines={9} />;
  if (list.isError) {
    const sentence = `${what.charAt(0).toUpperCase()}${what.slice(1)} could not be read.`;
    return <Failure error={list.error} what={sentence} onRetry={() => void list.refetch()} />;
  }
  const { data, nextCursor } = list.data;
  if (data.length === 0) return empty;
  return (
    <div aria-busy={list.isPlaceholderData} className={list.isPlaceholderData ? "opacity-60" : undefined}>
      {children(data)}
      <Pager
        newest={search.has("cursor") ? addressOf(path, withCursor(search, null)) : null}
        older={nextCursor === null ? null : addressOf(path, withCursor(search, nextCursor))}
      />
    </div>
  );
}

function withCursor(search: URLSearchParams, cursor: string | null): URLSearchParams {
  const next = new URLSearchParams(search);
  if (cursor === null) next.delete("cursor");
  else next.set("cursor", cursor);
  return next;
}

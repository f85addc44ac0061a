import { z } from "zod";
import { limits } from "../limits.ts";

/** Query members of every list. Text as it stands in the address; the page size is brought into range, not refused. */
export const pageQuery = {
  cursor: z
    .string()
    .max(500)
    .optional()
    .meta({ description: "nextCursor of the page before, with the same filters." }),
  limit: z
    .string()
    .regex(/^\d{1,10}$/, "A whole number.")
    .optional()
    .meta({
      description: `Items a page: 1 to ${limits.pageSizeMax}, ${limits.pageSizeDefault} when absent; larger is brought down.`,
    }),
};

/** One page of a list, newest first. */
export function pageOf<Item extends z.ZodType>(id: string, item: Item) {
  return z
    .object({
      data: z.array(item),
      nextCursor: z
        .string()
        .nullable()
        .meta({ description: "null on the last page: the only sign of the end." }),
      limit: z.number().int().meta({ description: "The page size used." }),
    })
    .meta({ id });
}

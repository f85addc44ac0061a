import { mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { z } from "zod";
import { runProgram } from "./run-program.ts";

const place = z.tuple([z.number(), z.number()]);
const drawing = z.object({
  errors: z.array(z.string()),
  fixes: z.array(z.string()),
  units: z.number(),
  layers: z.array(z.string()),
  entities: z.array(
    z.object({
      kind: z.string(),
      layer: z.string(),
      points: z.array(place).optional(),
      closed: z.boolean().optional(),
      radius: z.number().optional(),
      text: z.string().optional(),
      height: z.number().optional(),
    }),
  ),
});

export type ReadDrawing = z.infer<typeof drawing>;

/** Debian's own interpreter is the one that its package python3-ezdxf is for. */
const python = "/usr/bin/python3";

/** What ezdxf makes of a drawing: its faults, layers and entities. */
export async function readDrawing(dxf: Uint8Array): Promise<ReadDrawing> {
  const folder = await mkdtemp(join(tmpdir(), "borewright-dxf-"));
  try {
    const path = join(folder, "drawing.dxf");
    await writeFile(path, dxf);
    const { code, stdout, stderr } = await runProgram([python, "tests/support/read-drawing.py", path], {
      PYTHONIOENCODING: "utf-8",
    });
    if (code !== 0) throw new Error(stderr);
    return drawing.parse(JSON.parse(stdout));
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

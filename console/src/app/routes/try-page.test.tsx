import { fireEvent, screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { axisDeviationResponse } from "../../../../shared/schemas/axis-deviations.ts";
import { boreFitResponse } from "../../../../shared/schemas/bore-fits.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { axisRequest, boreRequest, sampleResponse } from "../../testing/sample-records.ts";
import { sampleId } from "../../testing/samples.ts";

const operation = (summary: string, examples: Record<string, { summary?: string; value: unknown }>) => ({
  post: { summary, requestBody: { content: { "application/json": { examples } } } },
});
const document_ = {
  status: 200,
  body: {
    paths: {
      "/v1/bore-fits": operation("Fit bores", {
        "as-found": { summary: "As found", value: boreRequest },
        small: { summary: "One bore", value: { units: { offset: "mm" } } },
      }),
      "/v1/axis-deviations": operation("Measure deviations", { line: { value: axisRequest } }),
      "/v1/meta": { get: {} },
    },
  },
};
const boreFits = "POST /v1/bore-fits";
const created = answer(boreFitResponse, sampleResponse("bore-fit") as never, 201);

const open = async (address = "/try") => {
  const service = serviceFor("engineer").on("GET /openapi.json", document_);
  const page = renderConsole(address);
  const editor = await screen.findByLabelText<HTMLTextAreaElement>("Request body, JSON");
  const send = () => page.user.click(screen.getByRole("button", { name: "Send call" }));
  const write = (text: string) => fireEvent.change(editor, { target: { value: text } });
  const answered = () => screen.getByRole("region", { name: "Answer" });
  return { ...page, service, editor, send, write, answered };
};

/** The stretches of the text that are marked as faulty. */
const marked = () =>
  [...document.querySelectorAll(".json-editor-marks mark")].map((mark) => mark.textContent);

describe("the try page", () => {
  it("shows its shape while the examples are read", async () => {
    const held = heldAnswer(document_);
    serviceFor("engineer").on("GET /openapi.json", held.answerer);
    renderConsole("/try");
    expect(await screen.findByText("Reading the examples")).toBeTruthy();
    held.release();
    expect(await screen.findByLabelText("Request body, JSON")).toBeTruthy();
  });

  it("says when the examples could not be read, and reads them again", async () => {
    const service = serviceFor("engineer").on("GET /openapi.json", noNetwork);
    const { user } = renderConsole("/try");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The examples could not be read.");
    service.on("GET /openapi.json", document_);
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByLabelText("Request body, JSON")).toBeTruthy();
  });

  it("begins with an empty body where the document has no example", async () => {
    const { editor } = await open("/try?endpoint=shim-moves");
    expect(editor.value).toBe("{}");
  });

  it("tells a viewer who may compute", async () => {
    serviceFor("viewer").on("GET /openapi.json", document_);
    renderConsole("/try");
    expect(await screen.findByText("Your role reads records")).toBeTruthy();
    expect(screen.queryByRole("button", { name: "Send call" })).toBeNull();
  });

  it("takes endpoint and example from the address, and puts the choice there", async () => {
    const { user, router, editor } = await open("/try?endpoint=bore-fits&example=small");
    expect(JSON.parse(editor.value)).toEqual({ units: { offset: "mm" } });
    await user.selectOptions(screen.getByLabelText("Endpoint"), "POST /v1/axis-deviations");
    expect(router.state.location.search).toBe("?endpoint=axis-deviations");
    expect(JSON.parse(screen.getByLabelText<HTMLTextAreaElement>("Request body, JSON").value)).toEqual(
      JSON.parse(JSON.stringify(axisRequest)),
    );
    await user.selectOptions(screen.getByLabelText("Endpoint"), "POST /v1/bore-fits");
    await user.selectOptions(screen.getByLabelText("Example"), "One bore");
    expect(router.state.location.search).toBe("?endpoint=bore-fits&example=small");
  });

  it("sends the text exactly as written, and shows the figure, the tables and the record left", async () => {
    const { service, editor, send, answered } = await open();
    service.on(boreFits, created);
    const text = editor.value;
    await send();
    expect(await within(answered()).findByText("201 Created")).toBeTruthy();
    expect(service.callsTo(boreFits)[0]?.bodyText).toBe(text);
    expect(within(answered()).getByRole("img", { name: "Figure 1. Bore section brg-1" })).toBeTruthy();
    const link = within(answered()).getByRole("link", { name: "Open the record" });
    expect(link.getAttribute("href")).toBe(`/calculations/${sampleId(200)}`);
    expect(within(answered()).getByRole("button", { name: "Copy record id" })).toBeTruthy();
  });

  it("shows another endpoint's figure", async () => {
    const { service, send, answered } = await open("/try?endpoint=axis-deviations");
    service.on(
      "POST /v1/axis-deviations",
      answer(axisDeviationResponse, sampleResponse("axis-deviation") as never, 201),
    );
    await send();
    expect(await within(answered()).findByRole("img", { name: "Figure 2. Plan and elevation" })).toBeTruthy();
  });

  it("sends with Ctrl+Enter from the text", async () => {
    const { service, editor, answered } = await open();
    service.on(boreFits, created);
    fireEvent.keyDown(editor, { key: "Enter", ctrlKey: true });
    expect(await within(answered()).findByText("201 Created")).toBeTruthy();
  });

  it("can be cancelled while it computes, and repeats under the same Idempotency-Key", async () => {
    const { service, user, send, answered } = await open();
    const held = heldAnswer(created);
    service.on(boreFits, held.answerer);
    await send();
    await user.click(await within(answered()).findByRole("button", { name: "Cancel call" }));
    expect((await screen.findByRole("alert")).textContent).toContain("You cancelled the call.");
    service.on(boreFits, created);
    await send();
    expect(await within(answered()).findByText("201 Created")).toBeTruthy();
    const [first, second] = service.callsTo(boreFits).map(({ headers }) => headers.get("idempotency-key"));
    expect(second).toBe(first);
  });

  it("makes a new record when it is sent again after an answer", async () => {
    const { service, send, answered } = await open();
    service.on(boreFits, created);
    await send();
    await within(answered()).findByText("201 Created");
    await send();
    await waitFor(() => expect(service.callsTo(boreFits)).toHaveLength(2));
    const [first, second] = service.callsTo(boreFits).map(({ headers }) => headers.get("idempotency-key"));
    expect(second).not.toBe(first);
  });
});

describe("the JSON editor", () => {
  const faulty =
    '{\n  "units": { "offset": "mm" },\n  "bores": [\n    { "id": "a", "points": [1, 2] }\n  ]\n}';

  it("underlines every fault at its pointer, lists it with what is allowed, and leads to it", async () => {
    const { service, user, send, write, editor } = await open();
    write(faulty);
    service.on(
      boreFits,
      refusal("out_of_range", {
        errors: [
          {
            pointer: "/bores/0/points/1",
            code: "out_of_range",
            detail: "Too large.",
            value: 2,
            unit: "mm",
            allowed: { min: 0, max: 1, unit: "mm" },
          },
          { pointer: "/units/axial", code: "units_missing", detail: "axial is missing." },
        ],
      }),
    );
    await send();
    await waitFor(() => expect(marked()).toEqual(['"units": { "offset": "mm" }', "2"]));
    expect(editor.getAttribute("aria-invalid")).toBe("true");
    const list = document.getElementById(editor.getAttribute("aria-describedby") ?? "");
    expect(list?.textContent).toContain("/bores/0/points/1");
    expect(list?.textContent).toContain("sent 2 mm, least 0, most 1 mm");
    await user.click(within(list as HTMLElement).getByRole("button", { name: "line 4" }));
    expect(document.activeElement).toBe(editor);
    expect(editor.value.slice(editor.selectionStart, editor.selectionEnd)).toBe("2");
  });

  it("takes its marks away when the text is changed", async () => {
    const { service, send, write } = await open();
    write(faulty);
    service.on(
      boreFits,
      refusal("out_of_range", { errors: [{ pointer: "/units", code: "out_of_range", detail: "No." }] }),
    );
    await send();
    await waitFor(() => expect(marked()).toHaveLength(1));
    write(faulty.replace("mm", "um"));
    await waitFor(() => expect(marked()).toEqual([]));
  });

  it("says where the text stops being JSON, and sends nothing", async () => {
    const { service, send, write, editor } = await open();
    write('{\n  "units": oops\n}');
    expect(await screen.findByRole("button", { name: "Line 2, column 12" })).toBeTruthy();
    await send();
    expect(service.callsTo(boreFits)).toEqual([]);
    expect(editor.selectionStart).toBe('{\n  "units": '.length);
  });

  it("keeps an edited text when the page is left, and restores the example when asked", async () => {
    const { user, write, router } = await open();
    write('{ "units": {} }');
    await router.navigate("/nowhere");
    await screen.findByText("There is no page at this address");
    await router.navigate("/try");
    const editor = await screen.findByLabelText<HTMLTextAreaElement>("Request body, JSON");
    expect(editor.value).toBe('{ "units": {} }');
    await user.click(screen.getByRole("button", { name: "Restore example" }));
    expect(JSON.parse(editor.value)).toEqual(JSON.parse(JSON.stringify(boreRequest)));
    expect(screen.queryByRole("button", { name: "Restore example" })).toBeNull();
  });

  it("is copied as a curl line that names a variable and no key", async () => {
    const { user, write } = await open();
    write('{ "note": "it\'s" }');
    await user.click(screen.getByRole("button", { name: /Copy as curl/ }));
    await screen.findByText("copied");
    expect(await navigator.clipboard.readText()).toBe(
      [
        `curl -sS '${location.origin}/v1/bore-fits' \\`,
        `  -H "Authorization: Bearer $BOREWRIGHT_KEY" \\`,
        `  -H 'Content-Type: application/json' \\`,
        `  --data-binary '{ "note": "it'\\''s" }'`,
      ].join("\n"),
    );
  });
});

import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import type { Map as MapLibreMap } from "maplibre-gl";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { DrawingOptions } from "@/components/drawing/create-drawing";
import { NOTHING_DRAWN } from "@/components/drawing/drawing";
import { NotesPanel } from "@/components/notes/notes-panel";
import type { Note } from "@/lib/schemas/notes";

// What draws on a map needs WebGL; the browser tests draw with it.
let drawing: DrawingOptions | null = null;
vi.mock("@/components/drawing/create-drawing", () => ({
  createDrawing: (options: DrawingOptions) => {
    drawing = options;
    const nothing = () => undefined;
    return { setMode: nothing, select: nothing, undo: nothing, redo: nothing, remove: nothing, stop: nothing };
  },
}));

const NOTE: Note = {
  id: "not_1",
  fieldId: "fld_east",
  text: "Wet spot",
  geometry: { type: "Point", coordinates: [-98.6, 38.41] },
  lengthM: null,
  createdBy: { id: "usr_1", name: "Ada Quill" },
  createdAt: "2026-10-14T16:05:00.000Z",
  updatedAt: "2026-10-14T16:05:00.000Z",
};
const fitBounds = vi.fn();
const MAP = { fitBounds } as unknown as MapLibreMap;
let sent: { method: string; path: string; body: unknown }[] = [];

beforeEach(() => {
  sent = [];
  drawing = null;
  vi.stubGlobal("fetch", (path: string, init: RequestInit = {}) => {
    sent.push({ method: init.method ?? "GET", path, body: init.body ? JSON.parse(String(init.body)) : null });
    if (init.method === "DELETE") return Promise.resolve(new Response(null, { status: 204 }));
    return Promise.resolve(Response.json({ ...NOTE, text: "Stone" }, { status: 201 }));
  });
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function show({ notes = [NOTE], mayWrite = true }: { notes?: Note[]; mayWrite?: boolean } = {}) {
  const others = { guides: [], fieldId: "fld_east", onEdited: () => undefined, onClose: () => undefined };
  render(
    <QueryClientProvider client={new QueryClient()}>
      <NotesPanel map={MAP} notes={notes} mayWrite={mayWrite} {...others} />
    </QueryClientProvider>,
  );
}

describe("the notes of a field", () => {
  it("say what, who and when, and are found on the map", async () => {
    show();
    expect(screen.getByText("Wet spot")).toBeInTheDocument();
    expect(screen.getByText("Ada Quill, 14 October 2026")).toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "See note 1 on the map" }));
    expect(fitBounds).toHaveBeenCalledOnce();
  });

  it("are only read by those who may not write", () => {
    show({ mayWrite: false });
    expect(screen.queryByRole("button", { name: /Change|Delete|Note on a place/ })).toBeNull();
  });

  it("are saved with what is drawn, once there is a place and a text", async () => {
    show({ notes: [] });
    await userEvent.click(screen.getByRole("button", { name: "Note on a place" }));
    await waitFor(() => expect(drawing?.mode).toBe("point"));
    expect(screen.queryByLabelText("What is there")).toBeNull();
    drawing!.onChange({ ...NOTHING_DRAWN, shapes: [{ id: "1", geometry: NOTE.geometry }] });
    const words = await screen.findByLabelText("What is there");
    expect(screen.getByRole("button", { name: "Save note" })).toBeDisabled();
    await userEvent.type(words, "Stone");
    await waitFor(() => expect(screen.getByRole("button", { name: "Save note" })).toBeEnabled());
    await userEvent.click(screen.getByRole("button", { name: "Save note" }));
    await waitFor(() => expect(screen.queryByLabelText("What is there")).toBeNull());
    expect(sent[0]).toEqual({
      method: "POST",
      path: "/api/v1/fields/fld_east/notes",
      body: { text: "Stone", geometry: NOTE.geometry },
    });
  });

  it("change where they are, and go", async () => {
    show();
    await userEvent.click(screen.getByRole("button", { name: "Change note 1" }));
    await waitFor(() => expect(drawing?.start).toEqual([NOTE.geometry]));
    const geometry = { type: "Point" as const, coordinates: [-98.61, 38.42] };
    drawing!.onChange({ ...NOTHING_DRAWN, shapes: [{ id: "1", geometry }] });
    await userEvent.click(await screen.findByRole("button", { name: "Save note" }));
    await waitFor(() => expect(sent[0]).toMatchObject({ method: "PATCH", body: { text: "Wet spot", geometry } }));
    await userEvent.click(await screen.findByRole("button", { name: "Delete note 1" }));
    await waitFor(() =>
      expect(sent.at(-1)).toMatchObject({ method: "DELETE", path: "/api/v1/fields/fld_east/notes/not_1" }),
    );
  });
});

import { cleanup, fireEvent, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeAll, describe, expect, it, vi } from "vitest";
import { FieldForm } from "@/components/fields/field-form";
import { UnitsProvider } from "@/components/units/use-units";
import { ApiProblem } from "@/lib/api/api-problem";

// The readers of files load when needed; that takes longer than a query waits.
beforeAll(async () => {
  await import("@/lib/fields/read-boundary-file");
});
afterEach(cleanup);

const SQUARE = [
  [-98.6, 38.4],
  [-98.598, 38.4],
  [-98.598, 38.402],
  [-98.6, 38.402],
  [-98.6, 38.4],
];
const [a, b, c, d] = SQUARE;
const BOW = [a, c, b, d, a];
const write = (ring: unknown) => JSON.stringify({ type: "Polygon", coordinates: [ring] });

const REFUSED = new ApiProblem({
  type: "about:blank",
  title: "The input breaks a rule",
  status: 422,
  detail: "The boundary was refused.",
  code: "bad_boundary",
  errors: [{ path: "boundary", message: "ring 1 crosses itself" }],
});

describe("a field's boundary", () => {
  it("is refused before saving where it crosses itself, and the words go when a good one comes", async () => {
    const onSave = vi.fn();
    const form = { saveWords: "Make the field", pending: false, failure: REFUSED, onSave };
    render(
      <UnitsProvider start="metric" keep={false}>
        <FieldForm start={{ name: "East quarter", farm: null, landowner: null }} {...form} />
      </UnitsProvider>,
    );
    expect(screen.getByText("Not saved")).toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Paste GeoJSON instead" }));
    fireEvent.change(screen.getByLabelText("GeoJSON"), { target: { value: write(BOW) } });
    expect(screen.getByText(/boundary’s .* crosses itself/)).toBeInTheDocument();
    expect(screen.getByRole("button", { name: "Make the field" })).toBeDisabled();
    fireEvent.change(screen.getByLabelText("GeoJSON"), { target: { value: write(SQUARE) } });
    expect(screen.queryByText(/crosses itself/)).not.toBeInTheDocument();
    expect(screen.queryByText("Not saved")).not.toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Make the field" }));
    await vi.waitFor(() => expect(onSave).toHaveBeenCalledOnce());
    expect(onSave.mock.calls[0]?.[1]).toMatchObject({ kind: "geometry" });
  });

  it("from a GPX track shows its outline, its area and how far it was open before it is saved", async () => {
    const onSave = vi.fn();
    render(
      <UnitsProvider start="metric" keep={false}>
        <FieldForm
          start={{ name: "East quarter", farm: null, landowner: null }}
          {...{ saveWords: "Make the field", pending: false, failure: null, onSave }}
        />
      </UnitsProvider>,
    );
    const points = [a, b, c, d].map((at) => `<trkpt lon="${at?.[0]}" lat="${at?.[1]}"/>`).join("");
    const near = '<trkpt lon="-98.6" lat="38.40005"/>';
    const text = `<gpx xmlns="http://www.topografix.com/GPX/1/1"><trk><trkseg>${points}${near}</trkseg></trk></gpx>`;
    const file = new File([text], "edge.gpx");
    file.arrayBuffer = async () => new TextEncoder().encode(text).buffer;
    await userEvent.upload(screen.getByLabelText("Choose a boundary file"), file);
    expect(await screen.findByText(/ends of track 1 lay 5\.\d m apart/)).toBeInTheDocument();
    expect(screen.getByRole("img", { name: "Outline of the boundary" })).toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Make the field" }));
    await vi.waitFor(() => expect(onSave.mock.calls[0]?.[1]).toMatchObject({ kind: "file", file }));
  });
});

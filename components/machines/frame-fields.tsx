"use client";

import { useFieldArray, useFormContext, useWatch } from "react-hook-form";
import { FRAME_QUESTIONS } from "@/components/machines/machine-form-fields";
import { Question, QuestionGrid } from "@/components/machines/question";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { Button } from "@/components/ui/button";

/** What the frame weighs and where it stands: needed for the weight check, optional for everything else. */
export function FrameFields() {
  const { control, setValue } = useFormContext<DraftMachine>();
  const frame: unknown = useWatch({ control, name: "frame" });
  const hasFrame = frame !== undefined && frame !== null;
  return (
    <section className="space-y-5">
      <h2 className="text-section">Its weight</h2>
      <p className="text-ink-soft">
        With this the pass verdict can say whether the frame was heavy enough to hold every row down, and which would
        lift first. Take the numbers from the manual or a scale; mind the limits of hitch, tyres and axle.
      </p>
      {hasFrame ? (
        <>
          <QuestionGrid questions={FRAME_QUESTIONS} />
          <BallastList />
          <Button kind="quiet" className="-ml-3" onClick={() => setValue("frame", undefined)}>
            Leave the weight out
          </Button>
        </>
      ) : (
        <Button onClick={() => setValue("frame", { ballast: [] })}>Say what it weighs</Button>
      )}
    </section>
  );
}

/** The part of the draft that this list fills. */
interface BallastDraft {
  frame: { ballast: { massKg?: number; behindHitchM?: number }[] };
}

function BallastList() {
  const { control } = useFormContext<BallastDraft>();
  const ballast = useFieldArray({ control, name: "frame.ballast" });
  return (
    <div className="space-y-3">
      <h3>Ballast</h3>
      {ballast.fields.map((piece, index) => (
        <div key={piece.id} className="grid items-end gap-3 border-l-2 border-rule pl-4 sm:grid-cols-[1fr_1fr_auto]">
          <Question question={{ key: `frame.ballast.${index}.massKg`, label: "Mass", unit: "kg" }} />
          <Question question={{ key: `frame.ballast.${index}.behindHitchM`, label: "Behind the hitch", unit: "m" }} />
          <Button kind="quiet" onClick={() => ballast.remove(index)}>
            Take away
          </Button>
        </div>
      ))}
      <Button onClick={() => ballast.append({})}>Add a piece of ballast</Button>
      <p className="text-table text-ink-soft">
        Lifting ballast is heavy work near raised parts: see the manual, and never stand under a raised machine.
      </p>
    </div>
  );
}

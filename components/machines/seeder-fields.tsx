"use client";

import { useFormContext, useWatch } from "react-hook-form";
import { FrameFields } from "@/components/machines/frame-fields";
import { PLACING_QUESTIONS, ROW_UNIT_QUESTIONS, TRAILED_QUESTIONS } from "@/components/machines/machine-form-fields";
import { QuestionGrid } from "@/components/machines/question";
import { RowCountsField } from "@/components/machines/row-counts-field";
import { RowListField } from "@/components/machines/row-list-field";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { WholeNumber } from "@/components/machines/whole-number";
import { SelectField } from "@/components/ui/form-field";

export function SeederFields() {
  const { control, register } = useFormContext<DraftMachine>();
  const hitch: unknown = useWatch({ control, name: "hitch" });
  return (
    <>
      <section className="space-y-5">
        <h2 className="text-section">Where its rows are</h2>
        <div className="grid gap-5 sm:grid-cols-2">
          <WholeNumber name="rowCount" label="Rows" />
          <SelectField
            label="Hitch"
            hint="A trailed machine follows its hitch pin and cuts corners; a rigid one does not."
            {...register("hitch")}
          >
            <option value="rigid">Rigid: mounted on the tractor</option>
            <option value="trailed">Trailed: pulled at a pin</option>
          </SelectField>
        </div>
        <QuestionGrid questions={PLACING_QUESTIONS} />
        {hitch === "trailed" ? <QuestionGrid questions={TRAILED_QUESTIONS} /> : null}
        <div className="grid gap-5 sm:grid-cols-2">
          <RowCountsField
            name="sections"
            label="Rows in each section"
            hint="Rows switched together, from the left, such as 6 6 6 6. Empty: not known."
          />
          <RowCountsField
            name="wings"
            label="Rows on each wing and the centre"
            hint="Parts of the frame that rise on their own, from the left, such as 8 8 8. Empty: one frame."
          />
        </div>
        <details>
          <summary className="inline-flex min-h-11 items-center text-slate underline underline-offset-3">
            Rows that stand unevenly
          </summary>
          <div className="mt-3 grid gap-5 sm:grid-cols-2">
            <RowListField name="rowOffsetsM" label="Right of the centre line, row by row" />
            <RowListField name="rowForwardM" label="Ahead of the line of rows, row by row" />
          </div>
        </details>
      </section>
      <section className="space-y-5">
        <h2 className="text-section">Its row units</h2>
        <QuestionGrid questions={ROW_UNIT_QUESTIONS} />
      </section>
      <FrameFields />
    </>
  );
}

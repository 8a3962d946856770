"use client";

import { COMBINE_QUESTIONS } from "@/components/machines/machine-form-fields";
import { QuestionGrid } from "@/components/machines/question";
import { WholeNumber } from "@/components/machines/whole-number";

export function CombineFields() {
  return (
    <div className="space-y-5">
      <QuestionGrid questions={COMBINE_QUESTIONS} />
      <div className="grid gap-5 sm:grid-cols-2">
        <WholeNumber name="headerRows" label="Rows of the header" hint="Leave empty for a header without rows." />
      </div>
    </div>
  );
}

"use client";

import { useMutation } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { CheckField } from "@/components/ui/check-field";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import { changeMe } from "@/lib/api/client";

export type ContrastName = "device" | "more";

/** Stronger lines and darker words, for a screen in the sun. The map's classes keep their colours. */
export function ContrastChoice({ start }: { start: ContrastName }) {
  const router = useRouter();
  const [contrast, setContrast] = useState(start);
  const save = useMutation({
    mutationFn: (next: ContrastName) => changeMe({ contrast: next }),
    onSuccess: () => router.refresh(),
    onError: () => setContrast(start),
  });
  return (
    <div className="space-y-1">
      <CheckField
        label="High contrast"
        hint="Black words on white, strong lines. On by itself where the device asks for more contrast."
        checked={contrast === "more"}
        onChange={(event) => {
          const next = event.target.checked ? "more" : "device";
          setContrast(next);
          save.mutate(next);
        }}
      />
      {save.error ? (
        <Notice state="act" urgent>
          {describeFailure(save.error)}
        </Notice>
      ) : null}
    </div>
  );
}

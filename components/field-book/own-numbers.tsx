"use client";

import { useState, type FormEvent } from "react";
import { edgeText, readEdge } from "@/components/field-book/edge-fields";
import type { ChannelUnits } from "@/components/field-book/use-channel-units";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { areClassEdges } from "@/lib/legend/class-edges";

/** An address, and the eye, hold no more. */
const MOST_EDGES = 24;

export interface OwnNumbersProps {
  edges: readonly number[];
  units: ChannelUnits;
  onEdges: (edges: number[]) => void;
  onClose: () => void;
}

/** Class edges as a line of numbers, as many as the person wants. */
export function OwnNumbers({ edges, units, onEdges, onClose }: OwnNumbersProps) {
  const [typed, setTyped] = useState(() =>
    edges.map((edge) => edgeText(edge / units.factor, units.decimals)).join("; "),
  );
  const [refusal, setRefusal] = useState<string | undefined>();
  const onSubmit = (event: FormEvent) => {
    event.preventDefault();
    const numbers = typed.split(/[;\s]+/).filter((part) => part !== "");
    const next = numbers.map((part) => readEdge(part) * units.factor);
    const wrong = numbers.find((_, i) => !Number.isFinite(next[i]!));
    if (wrong !== undefined) return setRefusal(`“${wrong}” is no number.`);
    if (!areClassEdges(next)) return setRefusal("Write at least one number, each larger than the one before.");
    if (next.length > MOST_EDGES) return setRefusal(`Write at most ${MOST_EDGES} numbers.`);
    onEdges(next);
    onClose();
  };
  return (
    <form onSubmit={onSubmit} className="space-y-1">
      <TextField
        label={`Class edges${units.symbol ? `, ${units.symbol}` : ""}`}
        hint="Rising, with a space or a semicolon between them."
        error={refusal}
        value={typed}
        autoFocus
        onChange={(event) => {
          setTyped(event.target.value);
          setRefusal(undefined);
        }}
      />
      <div className="flex gap-2">
        <Button type="submit" kind="primary">
          Use these
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Cancel
        </Button>
      </div>
    </form>
  );
}

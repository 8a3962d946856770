"use client";

import { KEY_LIST } from "@/components/field-book/keys/key-list";
import { setSingleKeys, useSingleKeys } from "@/components/field-book/keys/single-keys";
import { Dialog } from "@/components/ui/dialog";

/** All keys of the page, by where they work. */
export function KeyMap({ onClose }: { onClose: () => void }) {
  const areOn = useSingleKeys();
  return (
    <Dialog title="Keys" open onOpenChange={(open) => (open ? undefined : onClose())}>
      <div className="space-y-4">
        {KEY_LIST.map(({ place, keys }) => (
          <section key={place} aria-label={place}>
            <h3 className="mb-1 font-semibold">{place}</h3>
            <dl className="grid grid-cols-[8rem_1fr] gap-x-3 gap-y-1 text-table">
              {keys.map(([name, does]) => (
                <div key={name} className="contents">
                  <dt>
                    <kbd className="rounded border border-edge bg-paper px-1.5 font-sans">{name}</kbd>
                  </dt>
                  <dd className="text-ink-soft">{does}</dd>
                </div>
              ))}
            </dl>
          </section>
        ))}
        <label className="flex min-h-11 items-center gap-2 border-t border-rule pt-3 text-table">
          <input
            type="checkbox"
            checked={areOn}
            onChange={(event) => setSingleKeys(event.target.checked)}
            className="size-4 accent-ink"
          />
          Keys [ ] m and ? work anywhere on the page (turn off where speech or a switch types letters)
        </label>
      </div>
    </Dialog>
  );
}

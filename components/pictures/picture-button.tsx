"use client";

import { Image as ImageIcon } from "lucide-react";
import { useState } from "react";
import type { Figure } from "@/components/pictures/figure";
import type { PictureFormat } from "@/components/pictures/make-picture";
import { setGreyInk, useGreyInk } from "@/components/pictures/grey-ink";
import { useFigure, usePictures } from "@/components/pictures/picture-context";
import { classNames } from "@/components/ui/class-names";
import { Menu, MenuGroup, MenuItem, MenuRule } from "@/components/ui/menu";
import { pictureTitle } from "@/lib/pictures/picture-words";

export interface PictureButtonProps {
  figure: Figure;
  /** Also offers to print the page; on one figure of a page only. */
  withPrint?: boolean;
  className?: string;
}

/** Takes a chart or map away as a picture. Nothing on a page without a source to name. */
export function PictureButton({ figure, withPrint, className }: PictureButtonProps) {
  const pictures = usePictures();
  const [state, setState] = useState<{ busy: boolean; trouble: string | null }>({ busy: false, trouble: null });
  const isGrey = useGreyInk();
  useFigure(figure);
  if (!pictures) return null;
  const take = (format: PictureFormat) => {
    setState({ busy: true, trouble: null });
    // The part that makes pictures is fetched when one is wanted.
    import("@/components/pictures/make-picture")
      .then(({ makePicture }) => makePicture(figure, pictures.source, format))
      .then(
        () => setState({ busy: false, trouble: null }),
        (error: unknown) => setState({ busy: false, trouble: sayTrouble(error) }),
      );
  };
  return (
    <span className="no-print relative inline-flex" data-picture="skip">
      <Menu
        trigger={
          <button
            type="button"
            aria-label={`Picture of ${pictureTitle(figure.words)}`}
            title="Picture"
            disabled={state.busy}
            className={classNames("grid size-11 place-items-center text-ink hover:bg-paper md:size-9", className)}
          >
            <ImageIcon size={18} strokeWidth={1.5} aria-hidden />
          </button>
        }
      >
        <MenuGroup title={state.busy ? "Making the picture…" : "Take away as a picture"}>
          <MenuItem onSelect={() => take("png")}>PNG, ready for a report</MenuItem>
          <MenuItem onSelect={() => take("svg")}>SVG, for drawing on</MenuItem>
        </MenuGroup>
        {pictures.hasGrey ? (
          <>
            <MenuRule />
            <MenuItem onSelect={() => setGreyInk(!isGrey)}>
              {isGrey ? "Show in colour again" : "Show in grey, as printed"}
            </MenuItem>
          </>
        ) : null}
        {withPrint ? <MenuItem onSelect={() => setTimeout(() => window.print())}>Print this page</MenuItem> : null}
      </Menu>
      <span role="status" className="sr-only">
        {state.busy ? "Making the picture" : ""}
      </span>
      {state.trouble ? (
        <span
          role="alert"
          className="absolute right-0 top-full z-20 w-56 border border-clay bg-sheet p-2 text-table text-ink"
        >
          {state.trouble}
        </span>
      ) : null}
    </span>
  );
}

function sayTrouble(error: unknown): string {
  return error instanceof Error && error.message
    ? error.message
    : "The picture could not be made. Check the connection and try again.";
}

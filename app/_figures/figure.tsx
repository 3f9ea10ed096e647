import type { ReactNode } from "react";
import type { ChartSize } from "./chart";

/**
 * A figure with its caption, drawn twice: for its column on a desk and for a phone, so that lines and letters keep
 * their size instead of shrinking with the drawing. CSS shows one; print takes the first.
 */
export function Figure({
  desk,
  phone,
  number,
  caption,
  draw,
}: {
  desk: ChartSize;
  phone: ChartSize;
  /** "Figure 3." before the caption. */
  number?: number | undefined;
  caption?: ReactNode;
  draw: (size: ChartSize) => ReactNode;
}) {
  return (
    <figure className="figure">
      <div className="for-desk">{draw(desk)}</div>
      <div className="for-phone">{draw(phone)}</div>
      {(caption !== undefined || number !== undefined) && (
        <figcaption>
          {number !== undefined && <b>Figure {number}. </b>}
          {caption}
        </figcaption>
      )}
    </figure>
  );
}

/** Width of a drawing on a phone of 390 px with 16 px on both sides. */
export const PHONE_WIDTH = 358;

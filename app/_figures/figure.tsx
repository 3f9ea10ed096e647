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
      <div className="for-desk" style={{ maxWidth: desk.width * LARGEST_SCALE }}>
        {draw(desk)}
      </div>
      <div className="for-phone" style={{ maxWidth: phone.width * LARGEST_SCALE }}>
        {draw(phone)}
      </div>
      {(caption !== undefined || number !== undefined) && (
        <figcaption>
          {number !== undefined && <b>Figure {number}. </b>}
          {caption}
        </figcaption>
      )}
    </figure>
  );
}

/** A wider column leaves paper free rather than swelling lines and letters. */
const LARGEST_SCALE = 1.2;

/** Width of a drawing on a phone of 390 px with 16 px on both sides. */
export const PHONE_WIDTH = 358;

"use client";

import type { ComponentProps } from "react";
import { Button } from "./button";

/** Prints the page as it stands. */
export function PrintButton(look: Pick<ComponentProps<typeof Button>, "kind" | "size">) {
  return (
    <Button {...look} onClick={() => window.print()}>
      Print
    </Button>
  );
}

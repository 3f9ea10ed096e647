"use client";

import { Button } from "@/app/_ui/button";

export function PrintButton() {
  return (
    <Button size="small" onClick={() => window.print()}>
      Print
    </Button>
  );
}

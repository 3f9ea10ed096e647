"use client";

import { useEffect, useRef } from "react";

/** Takes a file that is dropped anywhere on the page, where the browser would leave the page to show it. */
export function useDroppedFile(onFile: (file: File) => void): void {
  const latest = useRef(onFile);
  useEffect(() => {
    latest.current = onFile;
  }, [onFile]);
  useEffect(() => {
    function over(event: DragEvent) {
      if (event.dataTransfer?.types.includes("Files")) event.preventDefault();
    }
    function drop(event: DragEvent) {
      const file = event.dataTransfer?.files[0];
      if (!file) return;
      event.preventDefault();
      latest.current(file);
    }
    window.addEventListener("dragover", over);
    window.addEventListener("drop", drop);
    return () => {
      window.removeEventListener("dragover", over);
      window.removeEventListener("drop", drop);
    };
  }, []);
}

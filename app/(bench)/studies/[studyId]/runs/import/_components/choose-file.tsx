"use client";

import { type DragEvent, useRef, useState } from "react";
import { BlankPaper } from "@/app/_figures/blank-paper";
import { Button } from "@/app/_ui/button";
import { TextArea } from "@/app/_ui/field";

/** Where a file is dropped or chosen, or cells are pasted. */
export function ChooseFile({
  onFile,
  onPaste,
}: {
  onFile: (file: File) => void;
  onPaste: (text: string) => void;
}) {
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const [pasted, setPasted] = useState("");
  // A text box turns every line end into one kind; the clipboard's own text is what is kept.
  const clipboard = useRef("");

  function drop(event: DragEvent) {
    event.preventDefault();
    // The page around takes what misses this area; this one was meant for it.
    event.stopPropagation();
    setOver(false);
    const file = event.dataTransfer.files[0];
    if (file) onFile(file);
    else onPaste(event.dataTransfer.getData("text/plain"));
  }

  return (
    <div className="grid gap-6">
      <section
        aria-label="Drop a file here"
        className={`import-drop ${over ? "over" : ""}`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        <BlankPaper width={300} height={120} />
        <h2>{over ? "Let go to read the file" : "Drop a file of traces here"}</h2>
        <p>
          CSV or text, a workbook (XLSX) or JCAMP-DX, up to 50 MB: one time column and a column for each run,
          a time column beside each signal, or the run named on every line.
        </p>
        <Button kind="primary" onClick={() => input.current?.click()}>
          Choose a file
        </Button>
        <input
          ref={input}
          type="file"
          className="sr-only"
          aria-label="File of traces"
          tabIndex={-1}
          accept=".csv,.tsv,.txt,.dat,.asc,.prn,.xlsx,.xlsm,.jdx,.dx,.jcm,text/*"
          onChange={(event) => {
            const file = event.target.files?.[0];
            // The same file chosen again is a new choice.
            event.target.value = "";
            if (file) onFile(file);
          }}
        />
      </section>
      <form
        id="paste"
        className="grid gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          const untouched = clipboard.current.replace(/\r\n?/g, "\n") === pasted;
          if (pasted.trim() !== "") onPaste(untouched ? clipboard.current : pasted);
        }}
      >
        <TextArea
          label="Or paste cells"
          hint="Copied from a spreadsheet with their line of names. The text is kept as it is pasted."
          rows={6}
          value={pasted}
          spellCheck={false}
          onPaste={(event) => {
            if (pasted === "") clipboard.current = event.clipboardData.getData("text/plain");
          }}
          onChange={(event) => setPasted(event.target.value)}
        />
        <div>
          <Button type="submit" disabled={pasted.trim() === ""}>
            Read the pasted cells
          </Button>
        </div>
      </form>
    </div>
  );
}

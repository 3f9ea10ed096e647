"use client";

import { setNonce } from "get-nonce";

/** Tells the dialogs' scroll lock, which adds a style element, the nonce that this page's policy allows. */
export function StyleNonce({ nonce }: { nonce: string | undefined }) {
  if (nonce !== undefined) setNonce(nonce);
  return null;
}

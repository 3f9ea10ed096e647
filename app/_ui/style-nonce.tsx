"use client";

import { setNonce } from "get-nonce";
import { useState } from "react";

/**
 * Tells the dialogs' scroll lock, which adds a style element, the nonce that this page's policy allows: that of the
 * document. What a navigation or an action brings later is drawn with a nonce of its own, which the policy refuses.
 */
export function StyleNonce({ nonce }: { nonce: string | undefined }) {
  const [ofDocument] = useState(nonce);
  if (ofDocument !== undefined) setNonce(ofDocument);
  return null;
}

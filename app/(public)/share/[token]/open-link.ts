import "server-only";
import { cache } from "react";
import { database } from "@/app/_server/database";
import { openShareLink } from "@/db/share-link/share-link.queries";

/**
 * The study behind a token, once per request for page and metadata, so that one opening counts as one. Undefined for
 * unknown, expired and revoked tokens alike.
 */
export const openLink = cache((token: string) => openShareLink(database(), token));

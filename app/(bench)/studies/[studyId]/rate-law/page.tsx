import type { Metadata } from "next";
import { rateLawView } from "@/app/_findings/rate-law.view";
import { RateLawSheet } from "@/app/_findings/rate-law-sheet";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { OrderForm } from "./_components/order-form";

export const metadata: Metadata = { title: "Rate law" };

/** Orders, k and their intervals from all standing runs, with what supports them and what could overturn them. */
export default async function RateLawPage({ params }: { params: Promise<{ studyId: string }> }) {
  const { studyId } = await params;
  const { sheet, revision, canEdit } = await openStudy(studyId);
  const view = rateLawView(sheet, await analyseStudy(database(), sheet));
  return (
    <RateLawSheet
      view={view}
      runsAddress={`/studies/${studyId}/runs`}
      orderForm={
        canEdit && view.orders.length > 0 ? (
          <OrderForm
            key={view.orders.map((order) => order.heldAt).join(" ")}
            target={{ studyId, base: revision }}
            orders={view.orders}
          />
        ) : null
      }
    />
  );
}

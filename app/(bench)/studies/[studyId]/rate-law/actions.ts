"use server";

import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { setOrders } from "@/db/study/set-orders";
import { ordersSchema } from "./schema";

/** Holds orders at a value or sets them free; the law is fitted anew. */
export const saveOrders = memberAction(ordersSchema, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    setOrders(db, actor, { studyId: input.studyId, base: input.base }, input.orders),
  ),
);

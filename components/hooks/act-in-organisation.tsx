"use client";

import { useInsertionEffect } from "react";
import { actIn } from "@/lib/api/request-json";

/** Told before any effect of the page asks for something: all of those run after insertion effects. */
export function ActInOrganisation({ slug }: { slug: string }) {
  useInsertionEffect(() => actIn(slug), [slug]);
  return null;
}

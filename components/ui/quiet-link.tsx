"use client";

import Link from "next/link";
import { useState, type ComponentProps } from "react";

/**
 * A link whose page is fetched ahead once somebody points at it or reaches it by keys, not as soon as it is on the screen: a
 * dozen pages fetched ahead would stand in the way of what the open page itself asks for.
 */
export function QuietLink(props: Omit<ComponentProps<typeof Link>, "prefetch">) {
  const [isNear, setNear] = useState(false);
  const approach = () => setNear(true);
  return <Link {...props} prefetch={isNear ? null : false} onMouseEnter={approach} onFocus={approach} />;
}

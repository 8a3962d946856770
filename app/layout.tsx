import type { Metadata, Viewport } from "next";
import type { ReactNode } from "react";
import { QueryProvider } from "@/components/hooks/query-provider";
import "@/app/globals.css";

export const metadata: Metadata = {
  title: { default: "Coulterbook", template: "%s · Coulterbook" },
  description: "Reads row-by-row seeding logs, puts every row on the ground and says which rows lost contact, and why.",
  icons: { icon: "/icons/coulterbook.svg" },
  robots: { index: false, follow: false },
};

export const viewport: Viewport = { width: "device-width", initialScale: 1, themeColor: "#FBFAF6" };

/** Every page carries a nonce of its own in its security policy, so none can be made ahead of time. */
export const dynamic = "force-dynamic";

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en">
      <body>
        <QueryProvider>{children}</QueryProvider>
      </body>
    </html>
  );
}

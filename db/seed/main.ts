// Makes the demo accounts and the demo farm, in demo mode only; run at every start, does nothing where all is there.
import { closeDatabases } from "@/db/client";
import { seedDemo, writeDemoFile } from "@/db/seed/demo";
import { seedOrganisations } from "@/db/seed/organisations";
import { createContainer } from "@/lib/server/create-container";
import { env } from "@/lib/server/env";

if (env().isDemo) {
  const container = createContainer(env());
  await seedOrganisations();
  // Tests that bring their own logs want the people only.
  if (process.env.SEED_LOGS !== "0") {
    await seedDemo(container);
    writeDemoFile();
  }
  await container.queue.close();
}
await closeDatabases();

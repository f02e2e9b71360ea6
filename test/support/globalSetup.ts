import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import type { TestProject } from "vitest/node";
import { cephInstalled, startGateway } from "./cephGateway.ts";

declare module "vitest" {
  interface ProvidedContext {
    /** Address that starts the gateway when first asked and answers where it is; `null` where Ceph is not installed. */
    gatewayDoor: string | null;
  }
}

/**
 * One S3 gateway (Ceph's) for the whole test run, started when the first test asks for it, so that runs
 * without storage tests do not wait for it. Says loudly when there is none.
 */
export default async function setup(project: TestProject): Promise<(() => Promise<void>) | undefined> {
  if (!cephInstalled()) {
    console.warn(
      "\n*** S3 TESTS ARE SKIPPED: no Ceph on the PATH (apt-get install ceph-mon ceph-osd radosgw ceph-common) ***\n",
    );
    project.provide("gatewayDoor", null);
    return undefined;
  }
  let starting: ReturnType<typeof startGateway> | undefined;
  const door = createServer((_request, response) => {
    starting ??= startGateway();
    starting.then(
      ({ gateway }) => response.end(JSON.stringify(gateway)),
      (error) => response.writeHead(500).end(String(error)),
    );
  });
  await new Promise<void>((resolve) => door.listen(0, "127.0.0.1", resolve));
  project.provide("gatewayDoor", `http://127.0.0.1:${(door.address() as AddressInfo).port}`);
  return async () => {
    door.close();
    door.closeAllConnections();
    await (await starting?.catch(() => undefined))?.stop();
  };
}

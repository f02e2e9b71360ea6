import { type ChildProcess, execFile, spawn } from "node:child_process";
import { randomUUID } from "node:crypto";
import { existsSync } from "node:fs";
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { delimiter, join } from "node:path";
import { promisify } from "node:util";

const run = promisify(execFile);

/** Where the gateway listens and what it accepts. */
export interface Gateway {
  readonly endpoint: string;
  readonly accessKey: string;
  readonly secretKey: string;
  /** A second user without any right of its own: what a bucket's policy lets it do is all it can. */
  readonly guest: { readonly arn: string; readonly accessKey: string; readonly secretKey: string };
}

/** Whether the programs are here: Debian's `ceph-mon ceph-osd radosgw ceph-common`. */
export function cephInstalled(): boolean {
  const folders = (process.env.PATH ?? "").split(delimiter);
  return ["ceph-mon", "ceph-osd", "radosgw", "radosgw-admin", "ceph"].every((program) =>
    folders.some((folder) => existsSync(join(folder, program))),
  );
}

/**
 * Starts a one-node Ceph with its S3 gateway on loopback, data in memory: a real S3 server with conditional
 * writes. Ports are free ones, so several may run side by side.
 */
export async function startGateway(): Promise<{ gateway: Gateway; stop: () => Promise<void> }> {
  const folder = await mkdtemp(join(tmpdir(), "ebbwire-ceph-"));
  const [monitor, monitorOld, web] = await Promise.all([freePort(), freePort(), freePort()]);
  const configuration = join(folder, "ceph.conf");
  const keyring = join(folder, "keyring");
  const map = join(folder, "monmap");
  const addresses = `[v2:127.0.0.1:${monitor},v1:127.0.0.1:${monitorOld}]`;
  const id = randomUUID();
  const watch = watchOver(folder);
  for (const part of ["mon", "osd", "rgw", "log", "run"]) await mkdir(join(folder, part));
  await writeFile(configuration, settings(folder, id, addresses, web));
  const ceph = (program: string, ...rest: string[]) => run(program, ["-c", configuration, ...rest]);
  const grant = (name: string, ...caps: string[]) =>
    run("ceph-authtool", [
      keyring,
      "--gen-key",
      "-n",
      name,
      ...caps.flatMap((cap) => ["--cap", ...cap.split("=")]),
    ]);

  await run("ceph-authtool", ["--create-keyring", keyring]);
  await grant("mon.", "mon=allow *");
  await grant("client.admin", "mon=allow *", "osd=allow *", "mgr=allow *");
  await grant("osd.0", "mon=allow profile osd", "osd=allow *");
  await grant("client.rgw.a", "mon=allow rw", "osd=allow rwx");
  await run("monmaptool", ["--create", "--clobber", "--fsid", id, "--addv", "a", addresses, map]);
  await ceph("ceph-mon", "-i", "a", "--mkfs", "--monmap", map, "--keyring", keyring);
  await ceph("ceph-mon", "-i", "a");
  const disk = randomUUID();
  await ceph("ceph", "osd", "new", disk, "0");
  await ceph("ceph-osd", "-i", "0", "--mkfs", "--osd-uuid", disk);
  await ceph("ceph-osd", "-i", "0");
  await ceph("ceph", "osd", "crush", "add", "osd.0", "1", "root=default", "host=localhost");
  const server = spawn("radosgw", ["-c", configuration, "-n", "client.rgw.a", "-f"], { stdio: "ignore" });
  await writeFile(join(folder, "run", "gateway.pid"), `${server.pid}\n`);

  const stop = async () => {
    watch.kill("SIGKILL");
    server.kill("SIGKILL");
    for (const name of await readdir(join(folder, "run"))) {
      if (!name.endsWith(".pid")) continue;
      const number = Number(await readFile(join(folder, "run", name), "utf8"));
      if (number > 0 && number !== server.pid) killQuietly(number);
    }
    await rm(folder, { recursive: true, force: true, maxRetries: 5 });
  };
  try {
    const guest = { arn: "arn:aws:iam:::user/guest", accessKey: "AKGUEST", secretKey: "SKGUEST" };
    const endpoint = `http://127.0.0.1:${web}`;
    const gateway = { endpoint, accessKey: "AKTEST", secretKey: "SKTEST", guest };
    await answering(gateway.endpoint);
    for (const [name, user] of Object.entries({ test: gateway, guest })) {
      const keys = ["--access-key", user.accessKey, "--secret-key", user.secretKey];
      await ceph("radosgw-admin", "user", "create", "--uid", name, "--display-name", name, ...keys);
    }
    return { gateway, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}

function settings(folder: string, id: string, addresses: string, port: number): string {
  return `[global]
fsid = ${id}
mon initial members = a
mon host = ${addresses}
public addr = 127.0.0.1
auth cluster required = cephx
auth service required = cephx
auth client required = cephx
keyring = ${folder}/keyring
osd pool default size = 1
osd pool default min size = 1
mon allow pool size one = true
osd crush chooseleaf type = 0
osd pool default pg num = 8
osd pool default pg autoscale mode = off
mon osd full ratio = .99
mon osd nearfull ratio = .99
osd failsafe full ratio = .999
mon data avail crit = 1
mon warn on pool no redundancy = false
run dir = ${folder}/run
log file = ${folder}/log/$name.log
admin socket = ${folder}/run/$name.$pid.asok
pid file = ${folder}/run/$name.pid
[mon.a]
mon data = ${folder}/mon
[osd.0]
osd data = ${folder}/osd
osd objectstore = memstore
memstore device bytes = 2147483648
[client.rgw.a]
rgw frontends = beast endpoint=127.0.0.1:${port}
rgw data = ${folder}/rgw
rgw run sync thread = false
rgw enable usage log = false
rgw thread pool size = 32
`;
}

async function answering(endpoint: string): Promise<void> {
  for (let attempt = 0; attempt < 240; attempt++) {
    const answered = await fetch(endpoint).then(
      () => true,
      () => false,
    );
    if (answered) return;
    await new Promise((resolve) => setTimeout(resolve, 250));
  }
  throw new Error("the Ceph gateway did not answer within a minute");
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer().once("error", reject);
    probe.listen(0, "127.0.0.1", () => {
      const address = probe.address();
      probe.close(() => resolve(typeof address === "object" ? address!.port : 0));
    });
  });
}

/** A small process of its own that clears everything away should this one be killed before it can. */
function watchOver(folder: string): ChildProcess {
  const script =
    'while kill -0 "$1" 2>/dev/null; do sleep 2; done; cat "$2"/run/*.pid | xargs -r kill -9; sleep 1; rm -rf "$2"';
  const watch = spawn("sh", ["-c", script, "watch", String(process.pid), folder], {
    detached: true,
    stdio: "ignore",
  });
  watch.unref();
  return watch;
}

function killQuietly(number: number): void {
  try {
    process.kill(number, "SIGKILL");
  } catch {
    // Gone already.
  }
}

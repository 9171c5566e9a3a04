import { existsSync } from "node:fs";
import { run, tail } from "./command.mjs";
import { Trouble } from "./trouble.mjs";

const APT_INSTALL =
  "apt-get install -y -qq --no-install-recommends" +
  " -o DPkg::Lock::Timeout=300 -o Dpkg::Options::=--force-confold";

/**
 * Debian makes and starts a cluster of its own when PostgreSQL arrives; ours is made by
 * `initdb` in a folder of ours. The first file stays (it says why), the second is put back.
 */
const NO_CLUSTER_BEFORE = `
conf=/etc/postgresql-common/createcluster.conf
if [ ! -e $conf ]; then
  mkdir -p /etc/postgresql-common
  printf '# Wanewright makes its own cluster and needs no main one.\\ncreate_main_cluster = false\\n' > $conf
fi
policy=/usr/sbin/policy-rc.d
if [ -e $policy ]; then mv $policy $policy.wanewright; fi
printf '#!/bin/sh\\nexit 101\\n' > $policy
chmod 755 $policy
trap 'rm -f $policy; if [ -e $policy.wanewright ]; then mv $policy.wanewright $policy; fi' EXIT
`;

/** Installs PostgreSQL's server and client from Debian. */
export function installPostgres() {
  return install(["postgresql"], "The database needs PostgreSQL", NO_CLUSTER_BEFORE);
}

/** Installs the browser that the end to end tests drive. */
export function installChromium() {
  return install(["chromium"], "The end to end tests need Chromium", "");
}

/**
 * Installs Debian packages, as root or through sudo; where neither is possible the message
 * names the command to run by hand.
 * @param {readonly string[]} packages
 * @param {string} why beginning of the message when it cannot be done
 * @param {string} before shell commands to run first, as root
 */
async function install(packages, why, before) {
  const names = packages.join(" ");
  const byHand = `sudo apt-get update && sudo apt-get install -y ${names}`;
  if (!existsSync("/usr/bin/apt-get")) {
    throw new Trouble(
      `${why}, and this system has no apt-get to install it with.`,
      `Install ${packages.join(" and ")} with the package manager of this system.`,
    );
  }
  const root = process.getuid?.() === 0;
  if (!root && (await run("sudo", ["-n", "true"])).code !== 0) {
    throw new Trouble(
      `${why}, and installing it needs the rights of an administrator.`,
      `Run this once, then try again: ${byHand}`,
    );
  }
  const script = [
    "export DEBIAN_FRONTEND=noninteractive",
    before,
    `${APT_INSTALL} ${names} && exit 0`,
    "apt-get update -qq -o DPkg::Lock::Timeout=300",
    `${APT_INSTALL} ${names}`,
  ].join("\n");
  const shell = ["sh", "-c", script];
  const result = root
    ? await run("sh", shell.slice(1), { mustFinish: true })
    : await run("sudo", ["-n", ...shell], { mustFinish: true });
  if (result.code !== 0) {
    throw new Trouble(
      `${why}, and installing it failed:\n${tail(result.output, 8)}`,
      `Check the network and the package sources, then run: ${byHand}`,
    );
  }
}

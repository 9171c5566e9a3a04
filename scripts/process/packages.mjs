import { spawnSync } from "node:child_process";
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
  const rights = await rightsToInstall();
  if (rights === "none") {
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
  const result = await runAsRoot(script, rights);
  if (result.code !== 0) {
    throw new Trouble(
      `${why}, and installing it failed:\n${tail(result.output, 8)}`,
      `Check the network and the package sources, then run: ${byHand}`,
    );
  }
}

/**
 * How this person may act as root: at once, through sudo, through sudo with a password that
 * somebody at the terminal can type, or not at all.
 * @returns {Promise<"root" | "sudo" | "password" | "none">}
 */
async function rightsToInstall() {
  if (process.getuid?.() === 0) return "root";
  const { code } = await run("sudo", ["-n", "true"]);
  if (code === 0) return "sudo";
  return code !== 127 && process.stdin.isTTY ? "password" : "none";
}

/**
 * Runs a shell script as root. Where a password is asked for, sudo keeps the terminal (its
 * consent is bound to it), and Ctrl-C must not break a half-done installation.
 * @param {string} script
 * @param {"root" | "sudo" | "password"} rights
 * @returns {Promise<{ code: number, output: string }>}
 */
async function runAsRoot(script, rights) {
  if (rights === "root") return run("sh", ["-c", script], { mustFinish: true });
  if (rights === "sudo") return run("sudo", ["-n", "sh", "-c", script], { mustFinish: true });
  const { status, stdout, stderr } = spawnSync("sudo", ["sh", "-c", `trap '' INT\n${script}`], {
    encoding: "utf8",
    maxBuffer: 64 * 1024 * 1024,
    stdio: ["inherit", "pipe", "pipe"],
  });
  return { code: status ?? 1, output: `${stdout}${stderr}` };
}

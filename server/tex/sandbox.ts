import { spawn } from "node:child_process";
import { existsSync } from "node:fs";

/**
 * TeX is a programming language, so it runs where it can do no harm: without network, without a shell, seeing only the
 * system's programs and its own input, writing only into memory that ends with it.
 *
 *   bubblewrap  every namespace its own, capabilities dropped, /usr and the TeX trees read-only, input read-only at /in,
 *               work in a bounded tmpfs; the PDF comes out on standard output, the log on standard error
 *   prlimit     processor seconds, memory, size of files, no core
 *   TeX itself  no \write18, and it opens only files of its own folder and its trees (openin_any, openout_any = p)
 *
 * Where the kernel or a container refuses namespaces, the last two remain; that is logged at the first use.
 */
export interface Limits {
  readonly seconds: number;
  readonly memoryMiB: number;
  readonly fileMiB: number;
  readonly pdfMiB: number;
}

/** What setting one paper may take. */
export const LIMITS: Limits = { seconds: 60, memoryMiB: 2048, fileMiB: 64, pdfMiB: 40 };

/** How TeX is confined on this machine. */
export type Confinement = "namespaces" | "limits";

export interface Ran {
  /** Exit status; null when it was stopped. */
  readonly status: number | null;
  readonly stopped: "time" | "size" | null;
  readonly output: Buffer;
  readonly log: string;
}

const MEBI = 1024 * 1024;
const LARGEST_LOG = 2 * MEBI;
const PROGRAMS = "/usr/local/bin:/usr/bin:/bin";

/** Nothing of this process's environment reaches TeX. */
const ENVIRONMENT: Readonly<Record<string, string>> = {
  PATH: PROGRAMS,
  LANG: "C.UTF-8",
  openin_any: "p",
  openout_any: "p",
  shell_escape: "f",
  // Messages are not broken into lines of 79 characters.
  max_print_line: "1000",
  error_line: "254",
  half_error_line: "238",
  SOURCE_DATE_EPOCH: "0",
};

/**
 * Folder of the input first, then the commands that make main.pdf and put it on standard output. A log of TeX's goes to
 * standard error. `$1` is the folder of the input.
 */
const MAKE_PDF = [
  'cp "$1"/* . || exit 9',
  "latexmk -norc -pdf -bibtex- -pdflatex='pdflatex -no-shell-escape -interaction=nonstopmode -halt-on-error -file-line-error %O %S' main.tex >&2",
  "status=$?",
  "[ $status -eq 0 ] && cat main.pdf",
  "exit $status",
].join("\n");

/** Where and how something runs confined. */
export interface Confined {
  /** Folder that is seen, read-only, as /in (by its own name where there are no namespaces). */
  readonly input: string;
  readonly confinement: Confinement;
  /** Folder to work in where there are no namespaces. */
  readonly scratch: string;
  readonly limits: Limits;
}

/** Runs the making of a PDF over the files of a folder. */
export function makePdf(confined: Confined): Promise<Ran> {
  return runConfined(MAKE_PDF, confined);
}

/** Runs a shell script, the folder of the input its `$1`, confined as TeX is. */
export function runConfined(script: string, { input, confinement, scratch, limits }: Confined): Promise<Ran> {
  const limited = ["prlimit", ...limitArguments(limits), "--", "sh", "-c", script, "sh"];
  if (confinement === "limits")
    return run(["env", "-i", ...environmentWords(scratch), ...limited, input], scratch, limits);
  return run(["bwrap", ...namespaces(input, limits), "--", ...limited, "/in"], "/", limits);
}

function limitArguments(limits: Limits): string[] {
  return [
    `--cpu=${limits.seconds}`,
    `--as=${limits.memoryMiB * MEBI}`,
    `--fsize=${limits.fileMiB * MEBI}`,
    "--core=0",
    "--nofile=256",
  ];
}

const environmentWords = (home: string) =>
  [...Object.entries(ENVIRONMENT), ["HOME", home], ["TEXMFHOME", home], ["TEXMFVAR", home]].map(
    ([name, value]) => `${name}=${value}`,
  );

/** Folders outside /usr that the TeX of Debian reads. */
const TEX_FOLDERS = ["/etc/texmf", "/var/lib/texmf", "/etc/alternatives", "/etc/perl"];
/** Where /usr is not merged these are folders of their own; else links into it. */
const ROOT_FOLDERS = ["/bin", "/lib", "/lib64", "/lib32"];

function namespaces(input: string | null, limits: Limits): string[] {
  const folders = [...ROOT_FOLDERS, ...TEX_FOLDERS]
    .filter((folder) => existsSync(folder))
    .flatMap((folder) => ["--ro-bind", folder, folder]);
  const words = Object.entries({ ...ENVIRONMENT, HOME: "/work", TEXMFHOME: "/work", TEXMFVAR: "/work" });
  return [
    "--unshare-all",
    "--unshare-user",
    ...["--uid", "65534", "--gid", "65534"],
    "--die-with-parent",
    "--new-session",
    "--cap-drop",
    "ALL",
    "--clearenv",
    ...words.flatMap(([name, value]) => ["--setenv", name, value]),
    "--ro-bind",
    "/usr",
    "/usr",
    ...folders,
    "--dev",
    "/dev",
    ...(input === null ? [] : ["--ro-bind", input, "/in"]),
    ...["--size", String(2 * limits.fileMiB * MEBI), "--tmpfs", "/work"],
    ...["--size", String(limits.fileMiB * MEBI), "--tmpfs", "/tmp"],
    "--chdir",
    "/work",
  ];
}

/** Finds out, by trying, how TeX can be confined here. @returns what can be done, and why no more */
export async function findConfinement(): Promise<{ confinement: Confinement; reason: string }> {
  const tried = await run(
    ["bwrap", ...namespaces(null, LIMITS), "--", "prlimit", ...limitArguments(LIMITS), "--", "true"],
    "/",
    { ...LIMITS, seconds: 10 },
  ).catch((error: unknown) => ({ status: null, log: String(error) }));
  return tried.status === 0
    ? { confinement: "namespaces", reason: "" }
    : { confinement: "limits", reason: tried.log.trim().slice(0, 300) };
}

/** Runs a program to its end or its limits; kills its whole group then. */
function run(command: readonly string[], cwd: string, limits: Limits): Promise<Ran> {
  return new Promise((resolve, reject) => {
    const [program = "", ...words] = command;
    const child = spawn(program, words, { cwd, detached: true, stdio: ["ignore", "pipe", "pipe"] });
    let stopped: Ran["stopped"] = null;
    const stop = (why: NonNullable<Ran["stopped"]>) => {
      if (stopped !== null) return;
      stopped = why;
      if (child.pid !== undefined) killGroup(child.pid);
    };
    const timer = setTimeout(() => stop("time"), limits.seconds * 1000);
    const output: Buffer[] = [];
    const log: Buffer[] = [];
    let outputSize = 0;
    let logSize = 0;
    child.stdout.on("data", (part: Buffer) => {
      outputSize += part.length;
      if (outputSize > limits.pdfMiB * MEBI) stop("size");
      else output.push(part);
    });
    child.stderr.on("data", (part: Buffer) => {
      logSize += part.length;
      if (logSize > LARGEST_LOG) stop("size");
      else log.push(part);
    });
    child.on("error", (error) => {
      clearTimeout(timer);
      reject(error);
    });
    child.on("close", (status) => {
      clearTimeout(timer);
      resolve({
        status: stopped ? null : status,
        stopped,
        output: Buffer.concat(output),
        log: Buffer.concat(log).toString("utf8"),
      });
    });
  });
}

function killGroup(pid: number): void {
  try {
    process.kill(-pid, "SIGKILL");
  } catch (error) {
    // It ended by itself in between.
    if (!(error instanceof Error && "code" in error && error.code === "ESRCH")) throw error;
  }
}

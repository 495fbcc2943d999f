import { execFile } from "node:child_process";
import { once } from "node:events";
import { mkdtemp, readFile, rm, writeFile } from "node:fs/promises";
import { type AddressInfo, createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { LatexSource } from "../../app/context.ts";
import { paperToLatex } from "../../app/export/index.ts";
import { texFaults } from "../../server/tex/faults.ts";
import { TexPdfService } from "../../server/tex/index.ts";
import { findConfinement, LIMITS, makePdf, runConfined } from "../../server/tex/sandbox.ts";
import { BIBLIOGRAPHY, computed, EVERYTHING, NOTHING_SHOWN } from "../export/sample.ts";

const run = promisify(execFile);
const TEX_TIME_MS = 120_000;
const silent = { info: () => {}, warn: () => {}, error: () => {} };

let folder = "";
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), "halfline-test-tex-"));
});
afterAll(() => rm(folder, { recursive: true, force: true }));

function document(body: string, preamble = ""): LatexSource {
  const text = `\\documentclass{article}${preamble}\n\\begin{document}\n${body}\n\\end{document}\n`;
  return { files: [{ name: "main.tex", text }], lineMap: (line) => line };
}

async function wordsOf(pdf: Uint8Array): Promise<string> {
  const file = join(folder, "read.pdf");
  await writeFile(file, pdf);
  const { stdout } = await run("pdftotext", ["-raw", file, "-"]);
  return stdout.normalize("NFC").replace(/[ \u00a0\n]+/g, " ");
}

describe("a paper as PDF", () => {
  const service = new TexPdfService({ log: silent });

  it(
    "holds every special character, every number and every part of the paper",
    async () => {
      const { paper, plan, results } = computed(EVERYTHING, BIBLIOGRAPHY);
      const made = await service.typeset(
        paperToLatex(paper, plan, results, NOTHING_SHOWN, { bibliography: BIBLIOGRAPHY }),
      );
      if (!made.ok) expect.fail(JSON.stringify(made.problems));
      const words = await wordsOf(made.pdf);
      for (const part of [
        "\\ { } $5 & # % _ ^ ~",
        "` < > | [x] * -- ---",
        "ÀÉîõüçñ ßæœøåłŁđğİ",
        "αβγ Ωμέγα ἄνθρωπος",
        "Колмогоров, Ёж, Щука",
        "Андрей Щербина",
        "“a” ‘b’ „c“ «d» ‹e›",
        "€ £ ¥; † ‡ § ¶ © ® ™ °",
        "code_with \\ % { } ~ ^",
        "Theorem 1.1 (Shift & turn)",
        "equation (1), Theo- rem 1.1, Figure 1, Table 2",
        "[2, Theorem 1.2]",
        "Castellane and Thorvik (2009)",
        "L. Maduró. Killed branching motions & more",
        "Institute of the Outer Bank & Sons, Søndre Holm",
        "2020 Mathematics Subject Classification. 60J80, 35K57",
        // e^{-(2+√2)}: see tests/export/latex.test.ts for its source.
        `The mean is ${Math.exp(-(2 + Math.SQRT2)).toPrecision(5)}`,
      ]) {
        expect(words).toContain(part);
      }
    },
    TEX_TIME_MS,
  );

  it(
    "is made from its source alone, outside the application, with nothing but latexmk",
    async () => {
      const { paper, plan, results } = computed(EVERYTHING, BIBLIOGRAPHY);
      const alone = await mkdtemp(join(folder, "alone-"));
      for (const file of paperToLatex(paper, plan, results, NOTHING_SHOWN, {
        bibliography: BIBLIOGRAPHY,
        lineNumbers: true,
      }).files)
        await writeFile(join(alone, file.name), file.text);
      await run("latexmk", ["-pdf", "-interaction=nonstopmode", "main.tex"], { cwd: alone, maxBuffer: 1e8 });
      expect((await readFile(join(alone, "main.pdf"))).subarray(0, 5).toString()).toBe("%PDF-");
      expect(await readFile(join(alone, "main.log"), "utf8")).not.toMatch(/undefined references|Missing character/);
    },
    TEX_TIME_MS,
  );

  it(
    "is refused with the line and the words of a mistake that only TeX sees",
    async () => {
      const text = "# A\n\nFirst.\n\nSecond with $x^a^b$ in it.\n";
      const { paper, plan, results } = computed(text);
      const made = await service.typeset(paperToLatex(paper, plan, results, NOTHING_SHOWN));
      expect(made).toEqual({
        ok: false,
        problems: [{ line: 5, message: "Two exponents follow one another: put braces round what belongs together." }],
      });
    },
    TEX_TIME_MS,
  );
});

describe("TeX that means harm", () => {
  const service = new TexPdfService({ log: silent, limits: { ...LIMITS, seconds: 20 } });

  it("is confined by namespaces on this machine, or says why not", async () => {
    const { confinement, reason } = await findConfinement();
    if (confinement === "limits") expect(reason).not.toBe("");
    else expect(reason).toBe("");
  });

  it(
    "reads no file of the machine",
    async () => {
      const secret = join(folder, "secret.txt");
      await writeFile(secret, "hush-hush-4711");
      for (const name of [secret, "/etc/passwd", `../../../../../..${secret}`, "/proc/self/environ"]) {
        const made = await service.typeset(
          document(
            `\\newread\\in\\openin\\in=${name} \\ifeof\\in closed\\else\\read\\in to\\x \\x\\fi \\IfFileExists{${name}}{there}{absent}`,
          ),
        );
        if (!made.ok) continue;
        const words = await wordsOf(made.pdf);
        expect(words).toContain("closed");
        expect(words).not.toMatch(/hush-hush|root:|PATH/);
      }
    },
    TEX_TIME_MS,
  );

  it(
    "runs no program and leaves no file outside its own folder",
    async () => {
      const left = join(folder, "left.txt");
      const made = await service.typeset(
        document(
          `\\immediate\\write18{touch ${left}}\\newwrite\\o\\immediate\\openout\\o=${left} \\immediate\\write\\o{x}\\closeout\\o x`,
        ),
      );
      await expect(readFile(left)).rejects.toThrow(/ENOENT/);
      // Opening a file elsewhere is refused by TeX itself, which stops.
      expect(made.ok).toBe(false);
    },
    TEX_TIME_MS,
  );

  it(
    "sees neither the network nor this process's environment and folders, and can write nothing but its own",
    async () => {
      const { confinement } = await findConfinement();
      if (confinement === "limits") return;
      const listener = createServer((socket) => socket.end()).listen(0, "127.0.0.1");
      await once(listener, "listening");
      const { port } = listener.address() as AddressInfo;
      process.env.HALFLINE_TEST_SECRET = "hush-hush-4712";
      const look = [
        "env; ls / /in; ls /root /home /etc /proc 2>&1",
        `cat ${join(folder, "secret.txt")} /etc/passwd 2>&1`,
        "touch /in/x /usr/x /x 2>&1; id -u",
        `perl -MIO::Socket::INET -e 'print IO::Socket::INET->new(PeerAddr=>"127.0.0.1:${port}", Timeout=>2) ? "reached" : "unreached"'`,
      ].join("; ");
      const seen = (
        await runConfined(look, { input: folder, confinement, scratch: folder, limits: LIMITS })
      ).output.toString();
      delete process.env.HALFLINE_TEST_SECRET;
      listener.close();
      expect(seen).toContain("unreached");
      expect(seen).not.toMatch(/hush-hush|root:x|DATABASE|npm_/);
      expect(seen.match(/Read-only file system|Permission denied/g)?.length).toBeGreaterThanOrEqual(2);
      expect(seen).toContain("65534");
    },
    TEX_TIME_MS,
  );

  it(
    "is stopped when it does not end",
    async () => {
      const impatient = new TexPdfService({ log: silent, limits: { ...LIMITS, seconds: 4 } });
      const begun = performance.now();
      const made = await impatient.typeset(document("\\def\\a{\\a}\\a"));
      expect(made.ok).toBe(false);
      expect(performance.now() - begun).toBeLessThan(15_000);
    },
    TEX_TIME_MS,
  );

  it(
    "is stopped when its PDF or its memory grows beyond the limits",
    async () => {
      const small = new TexPdfService({ log: silent, limits: { ...LIMITS, pdfMiB: 0.001 } });
      expect(await small.typeset(document("Larger than a kilobyte."))).toMatchObject({
        ok: false,
        problems: [{ line: null }],
      });
      const grown = await service.typeset(document("\\def\\a{\\a x}\\edef\\b{\\a}"));
      expect(grown).toMatchObject({
        ok: false,
        problems: [{ message: "This needs more memory than TeX has: a macro may unfold without end." }],
      });
    },
    TEX_TIME_MS,
  );

  it(
    "is held by TeX's own restrictions where there are no namespaces",
    async () => {
      const input = await mkdtemp(join(folder, "in-"));
      const scratch = await mkdtemp(join(folder, "scratch-"));
      const name = join(folder, "secret.txt");
      await writeFile(name, "hush-hush-4711");
      await writeFile(
        join(input, "main.tex"),
        document(
          `\\newread\\in\\openin\\in=${name} \\ifeof\\in closed\\fi \\immediate\\write18{touch ${join(folder, "left.txt")}}`,
        ).files[0]?.text ?? "",
      );
      const ran = await makePdf({ input, confinement: "limits", scratch, limits: LIMITS });
      expect(ran.status).toBe(0);
      expect(await wordsOf(ran.output)).toContain("closed");
      await expect(readFile(join(folder, "left.txt"))).rejects.toThrow(/ENOENT/);
    },
    TEX_TIME_MS,
  );
});

describe("mistakes in TeX's words", () => {
  const fault = (log: string) => texFaults(log, (line) => line - 100)[0];

  it.each([
    ["./main.tex:123: Undefined control sequence.\nl.123 and \\foo\n  bar", "TeX does not know `\\foo`."],
    ["./main.tex:123: Missing $ inserted.\n", "A brace or a dollar of a formula has no partner."],
    [
      "./main.tex:123: LaTeX Error: Command \\E already defined.\n",
      "The macro `\\E` is a command of LaTeX already: choose another name.",
    ],
    ["./main.tex:123: Misplaced alignment tab character &.\n", "`&` stands outside an alignment."],
    ["./main.tex:123: Something odd.\n", "TeX says: Something odd."],
  ])("%j", (log, message) => {
    expect(fault(log)).toEqual({ line: 23, message });
  });

  it("say so when TeX stopped without a word", () => {
    expect(fault("")).toEqual({ line: null, message: "TeX stopped without saying why." });
  });
});

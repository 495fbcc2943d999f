import { createHash } from "node:crypto";
import { mkdir, mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { LatexSource, Log, PdfService } from "../../app/context.ts";
import { type TexFault, texFaults } from "./faults.ts";
import { type Confinement, findConfinement, LIMITS, type Limits, makePdf, type Ran } from "./sandbox.ts";

/** PDFs kept for whoever asks for the same again. */
const KEPT = 6;
/** At most this many papers are set at once, and this many more wait. */
const AT_ONCE = 1;
const MOST_WAITING = 8;

type Typeset = Awaited<ReturnType<PdfService["typeset"]>>;

/** Makes PDFs of LaTeX sources, one after the other, each confined (see sandbox.ts). */
export class TexPdfService implements PdfService {
  private readonly log: Log;
  private readonly limits: Limits;
  private confinement: Promise<Confinement> | null = null;
  private readonly kept = new Map<string, Promise<Typeset>>();
  private running = 0;
  private readonly waiting: (() => void)[] = [];

  constructor(options: { readonly log: Log; readonly limits?: Limits }) {
    this.log = options.log;
    this.limits = options.limits ?? LIMITS;
  }

  /** The same source, asked for twice, is set once. */
  typeset(source: LatexSource): Promise<Typeset> {
    const key = createHash("sha256").update(JSON.stringify(source.files)).digest("hex");
    const known = this.kept.get(key);
    if (known) return known;
    const made = this.setNew(source);
    this.kept.set(key, made);
    const [oldest] = this.kept.keys();
    if (this.kept.size > KEPT && oldest !== undefined) this.kept.delete(oldest);
    // Only a PDF is worth keeping: what failed may have failed for want of time.
    const forget = () => this.kept.delete(key);
    made.then((result) => result.ok || forget(), forget);
    return made;
  }

  private async setNew(source: LatexSource): Promise<Typeset> {
    if (this.waiting.length >= MOST_WAITING)
      return failure(`${MOST_WAITING} papers wait to be set. Try again in a minute.`);
    await this.begin();
    const folder = await mkdtemp(join(tmpdir(), "halfline-tex-"));
    try {
      return await this.make(source, folder);
    } finally {
      await rm(folder, { recursive: true, force: true });
      this.end();
    }
  }

  private async make(source: LatexSource, folder: string): Promise<Typeset> {
    const input = join(folder, "in");
    const scratch = join(folder, "scratch");
    await Promise.all([mkdir(input), mkdir(scratch)]);
    for (const file of source.files) {
      if (!/^[A-Za-z0-9][A-Za-z0-9._-]*$/.test(file.name))
        throw new Error(`"${file.name}" cannot name a file of a LaTeX source.`);
      await writeFile(join(input, file.name), file.text);
    }
    const ran = await makePdf({ input, confinement: await this.confined(), scratch, limits: this.limits });
    if (ran.status === 0 && ran.output.subarray(0, 5).toString("latin1") === "%PDF-")
      return { ok: true, pdf: new Uint8Array(ran.output) };
    const problems = this.problemsOf(ran, source);
    this.log.warn(
      { problems, stopped: ran.stopped, status: ran.status, end: ran.log.slice(-800) },
      "a paper could not be set",
    );
    return { ok: false, problems };
  }

  private problemsOf(ran: Ran, source: LatexSource): readonly TexFault[] {
    if (ran.stopped === "time")
      return [{ line: null, message: `Setting the paper took more than ${this.limits.seconds} s and was stopped.` }];
    if (ran.stopped === "size")
      return [{ line: null, message: `The PDF would be larger than ${this.limits.pdfMiB} MB.` }];
    return texFaults(ran.log, (line) => source.lineMap(line));
  }

  private confined(): Promise<Confinement> {
    this.confinement ??= findConfinement().then(({ confinement, reason }) => {
      if (confinement === "limits") {
        this.log.warn(
          { reason },
          "This machine grants no namespaces: TeX runs with its own restrictions and resource limits only.",
        );
      }
      return confinement;
    });
    return this.confinement;
  }

  private async begin(): Promise<void> {
    if (this.running >= AT_ONCE) await new Promise<void>((resolve) => this.waiting.push(resolve));
    else this.running += 1;
  }

  /** Hands the place on to the next in line. */
  private end(): void {
    const next = this.waiting.shift();
    if (next) next();
    else this.running -= 1;
  }
}

const failure = (message: string): Typeset => ({ ok: false, problems: [{ line: null, message }] });

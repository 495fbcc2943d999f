import type { z } from "zod";
import { refusal } from "../../access/index.server.ts";

/**
 * Reads a JSON body of the given shape.
 * @throws Response 400 with what does not fit
 */
export async function readBody<Shape extends z.ZodType>(request: Request, shape: Shape): Promise<z.infer<Shape>> {
  let json: unknown;
  try {
    json = await request.json();
  } catch {
    throw refusal(400, "The body is not JSON.");
  }
  const read = shape.safeParse(json);
  if (read.success) return read.data;
  const faults = read.error.issues.map((issue) => `${issue.path.join(".") || "body"}: ${issue.message}`);
  throw refusal(400, faults.join("; "));
}

import { refusal, requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import { findPlate, plateFace } from "../plate/index.server.ts";
import { PlatePage } from "../plate/index.ts";
import type { Route } from "./+types/paper.plate";
import { readPrinted } from "./parts/printed.server.ts";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const printed = await readPrinted(context.get(servicesContext), paper.id);
  const plate = findPlate(printed, params.cell);
  if ("absent" in plate) throw refusal(404, plate.absent);
  return { paperId: paper.id, paperTitle: paper.title, face: plateFace(plate, printed) };
}

export default function PlateOfPaper({ loaderData }: Route.ComponentProps) {
  return (
    <>
      <title>{`${loaderData.face.title} of ${loaderData.paperTitle} · Halfline`}</title>
      <PlatePage {...loaderData} />
    </>
  );
}

import { index, type RouteConfig, route } from "@react-router/dev/routes";

export default [
  index("routes/welcome.tsx"),
  route("sign-in", "routes/sign-in.tsx"),
  route("sign-in/github", "routes/sign-in.github.ts"),
  route("sign-in/github/callback", "routes/sign-in.github.callback.ts"),
  route("sign-out", "routes/sign-out.ts"),
  route("shelf", "routes/shelf.tsx"),
  route("settings", "routes/settings.tsx"),
  route("theme", "routes/theme.ts"),
  route("specimen", "routes/specimen.ts"),
  route("manual", "routes/manual.tsx"),

  route("papers/:paperId", "routes/paper.tsx"),
  route("papers/:paperId/title-page", "routes/paper.title-page.tsx"),
  route("papers/:paperId/galley", "routes/paper.galley.tsx"),
  route("papers/:paperId/latex.zip", "routes/paper.latex.ts"),
  route("papers/:paperId/paper.pdf", "routes/paper.pdf.ts"),
  route("papers/:paperId/plates/:cell", "routes/paper.plate.tsx"),
  route("papers/:paperId/plates/:cell/:file", "routes/paper.plate.files.ts"),
  route("papers/:paperId/compute", "routes/paper.compute.ts"),
  route("papers/:paperId/cancel", "routes/paper.cancel.ts"),
  route("papers/:paperId/stand", "routes/paper.stand.ts"),
  route("papers/:paperId/results", "routes/paper.results.ts"),
] satisfies RouteConfig;

import type { Request, Response } from "express";

/** Refuses a request before it reaches the pages: a small page of words for people, JSON for programs. */
export function refuse(request: Request, response: Response, status: number, message: string): void {
  response.status(status).set("Cache-Control", "no-store");
  if (request.accepts(["json", "html"]) === "html") {
    response.type("html").send(`<!doctype html><html lang="en"><head><meta charset="utf-8">
<meta name="viewport" content="width=device-width,initial-scale=1"><title>Halfline</title></head>
<body><main><h1>Halfline</h1><p>${message}</p><p><a href="/">To the first page</a></p></main></body></html>`);
  } else {
    response.json({ message });
  }
}

import type { Request, Response } from "express";

/** The sheet's colours; the style sheets of the pages may be out of reach where this is shown. */
const STYLE = `:root{color-scheme:light dark;background:#fbfbf8;color:#1a2129;font:18px/28px Lora,Georgia,serif}
main{max-width:40rem;margin:0 auto;padding:6rem 1.25rem}h1{font-size:38px;line-height:44px;font-weight:500}a{color:inherit}
@media (prefers-color-scheme:dark){:root{background:#14181c;color:#e7e5dd}}`;

/** Refuses a request before it reaches the pages: a small page of words for people, JSON for programs. */
export function refuse(request: Request, response: Response, status: number, message: string): void {
  response.status(status).set("Cache-Control", "no-store");
  if (request.accepts(["json", "html"]) === "html") {
    response.type("html").send(`<!doctype html><html lang="en"><head><meta charset="utf-8">
<meta name="viewport" content="width=device-width,initial-scale=1"><title>Halfline</title><style nonce="${response.locals.nonce}">${STYLE}</style></head>
<body><main><h1>Halfline</h1><p>${message}</p><p><a href="/">To the first page</a></p></main></body></html>`);
  } else {
    response.json({ message });
  }
}

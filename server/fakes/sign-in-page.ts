import { DEMO_PEOPLE } from "./people.ts";

/** Text for HTML, also inside double quotes. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}

/** The stand-in's own page: who signs in? It must not be taken for the provider's. */
export function signInPage(query: Readonly<Record<string, string>>): string {
  const hidden = Object.entries(query)
    .map(([name, value]) => `<input type="hidden" name="${escapeHtml(name)}" value="${escapeHtml(value)}">`)
    .join("");
  const people = DEMO_PEOPLE.map(
    (person) => `<li><form method="post" action="/login/oauth/authorize">${hidden}
      <button name="subject" value="${person.subject}">${escapeHtml(person.name)}</button>
      <span>${escapeHtml(person.about)}</span></form></li>`,
  ).join("\n");
  return page(
    "Who signs in?",
    `<p class="mark">Demo</p>
<h1>Who signs in?</h1>
<p>This page stands in for GitHub while Halfline runs as a demo on this machine. The people are invented, and nothing leaves the machine.</p>
<ul>${people}</ul>
<form method="post" action="/login/oauth/authorize">${hidden}<button name="subject" value="">Nobody; go back</button></form>`,
  );
}

/** A page that refuses, in the stand-in's looks. */
export function refusalPage(reason: string): string {
  return page("Not accepted", `<p class="mark">Demo</p><h1>Not accepted</h1><p>${escapeHtml(reason)}</p>`);
}

function page(title: string, body: string): string {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1">
<title>${escapeHtml(title)} · stand-in for GitHub</title><style>
:root{color-scheme:light dark;--paper:#fbfbf8;--ink:#1a2129;--ink-2:#47515b;--rule:#d2d5d0;--edge:#858d92}
@media (prefers-color-scheme:dark){:root{--paper:#14181c;--ink:#e7e5dd;--ink-2:#b7bbba;--rule:#333a40;--edge:#6f787e}}
body{margin:0;background:var(--paper);color:var(--ink);font:18px/28px Lora,Georgia,serif}
main{max-width:34rem;margin:0 auto;padding:4rem 1.5rem}
h1{font-size:27px;line-height:34px;font-weight:500;margin:0 0 .75rem}
p{margin:0 0 1.25rem;color:var(--ink-2)}
.mark{font-size:14px;line-height:20px;border-top:2.5px solid var(--ink);padding-top:.5rem;color:var(--ink)}
ul{list-style:none;padding:0;margin:0 0 1.5rem;border-top:1px solid var(--ink)}
li{border-bottom:1px solid var(--rule);padding:.5rem 0}
li form{display:flex;gap:1rem;align-items:baseline;justify-content:space-between;flex-wrap:wrap}
li span{font-size:15px;color:var(--ink-2)}
button{font:inherit;color:inherit;background:none;border:0;padding:0;cursor:pointer;text-decoration:underline;text-decoration-color:var(--edge);text-underline-offset:4px;text-decoration-thickness:1px}
:focus-visible{outline:2px solid var(--ink);outline-offset:3px}
</style></head><body><main>${body}</main></body></html>`;
}

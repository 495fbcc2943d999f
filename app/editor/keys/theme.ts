/** Makes a dark page light or a light one dark, where it stands, and keeps that in the browser for every page. */
export async function turnTheme(tell: (words: string) => void): Promise<void> {
  const root = document.documentElement;
  const theme = isDark(root) ? "light" : "dark";
  root.dataset.theme = theme;
  const words = theme === "dark" ? "Dark" : "Light";
  const kept = await fetch("/theme", { method: "POST", body: new URLSearchParams({ theme }) }).catch(() => null);
  tell(kept?.ok === true ? `${words}, on every page in this browser.` : `${words} on this page; it could not be kept.`);
}

/** As chosen, else as the machine is set. */
function isDark({ dataset }: HTMLElement): boolean {
  return dataset.theme === undefined
    ? window.matchMedia("(prefers-color-scheme: dark)").matches
    : dataset.theme === "dark";
}

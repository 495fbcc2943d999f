// @vitest-environment jsdom
import { afterEach, describe, expect, test, vi } from "vitest";
import type { WebsocketProvider } from "y-websocket";
import * as Y from "yjs";
import { JoinedChanges } from "../../app/editor/live/joined-changes.ts";
import { followNetwork } from "../../app/editor/live/network.ts";

/** A page that is away, and what it counts of its own edits. */
function away(begins = "Words that are known to both. And some more of them.") {
  const doc = new Y.Doc();
  const text = doc.getText("text");
  text.insert(0, begins);
  const changes = new JoinedChanges();
  text.observe((event, { local }) => {
    if (local) changes.noteOwn(event);
  });
  return { doc, text, changes };
}

/** Another's page, with what both had. */
function another(doc: Y.Doc): Y.Text {
  const other = new Y.Doc();
  Y.applyUpdate(other, Y.encodeStateAsUpdate(doc));
  return other.getText("text");
}

function typed(text: Y.Text, at: number, word: string): void {
  for (const [index, letter] of [...word].entries()) text.insert(at + index, letter);
}

const nobody = () => undefined;

describe("what was written on both sides of a lost connection", () => {
  test("nothing is nothing to tell", () => {
    expect(away().changes.words(nobody)).toBeNull();
  });

  test("a word typed and mended is one change; a second place is a second", () => {
    const { text, changes } = away();
    typed(text, 5, "new ");
    text.delete(8, 1);
    text.insert(8, "s ");
    expect(changes.words(nobody)).toBe("1 change by you was joined.");
    typed(text, 30, "far");
    expect(changes.words(nobody)).toBe("2 changes by you were joined.");
  });

  test("others are told by their names, and those without one as others, last", () => {
    const { doc, text, changes } = away();
    const before = Y.encodeStateVector(doc);
    const tormod = another(doc);
    const unknown = another(doc);
    for (const at of [0, 20, 40]) typed(tormod, at, "and ");
    typed(unknown, 10, "xyz");
    typed(text, 5, "new ");
    for (const side of [unknown, tormod]) {
      if (side.doc !== null) changes.noteOthers(Y.encodeStateAsUpdate(side.doc, before));
    }
    const words = changes.words((client) => (client === tormod.doc?.clientID ? "Tormod Hagelund" : undefined));
    expect(words).toBe("1 change by you, 3 by Tormod Hagelund and 1 by others were joined.");
  });

  test("without own changes the others' are told", () => {
    const { doc, changes } = away();
    const before = Y.encodeStateVector(doc);
    const tormod = another(doc);
    typed(tormod, 3, "s");
    if (tormod.doc !== null) changes.noteOthers(Y.encodeStateAsUpdate(tormod.doc, before));
    expect(changes.words(() => "Tormod")).toBe("1 change by Tormod was joined.");
  });
});

describe("the network's going and coming", () => {
  afterEach(() => vi.restoreAllMocks());

  function tie(answers: boolean) {
    const provider = { wsconnected: true, connect: vi.fn(), disconnect: vi.fn() };
    provider.disconnect.mockImplementation(() => {
      provider.wsconnected = false;
    });
    const end = followNetwork(provider as unknown as WebsocketProvider, async () => answers);
    return { provider, end };
  }

  async function tell(event: "offline" | "online"): Promise<void> {
    vi.spyOn(navigator, "onLine", "get").mockReturnValue(event === "online");
    window.dispatchEvent(new Event(event));
    await Promise.resolve();
    await Promise.resolve();
  }

  test("without network the server is let go of at once, and taken hold of when it is back", async () => {
    const { provider, end } = tie(false);
    await tell("offline");
    expect(provider.disconnect).toHaveBeenCalledOnce();
    await tell("online");
    expect(provider.connect).toHaveBeenCalledOnce();
    end();
  });

  test("a server that answers nevertheless is kept", async () => {
    const { provider, end } = tie(true);
    await tell("offline");
    await tell("online");
    expect(provider.disconnect).not.toHaveBeenCalled();
    expect(provider.connect).not.toHaveBeenCalled();
    end();
  });

  test("a tie that was closed for good is not taken up again, nor one that has ended", async () => {
    const closed = tie(false);
    closed.provider.wsconnected = false;
    await tell("offline");
    await tell("online");
    expect(closed.provider.connect).not.toHaveBeenCalled();
    closed.end();
    const ended = tie(false);
    ended.end();
    await tell("offline");
    expect(ended.provider.disconnect).not.toHaveBeenCalled();
  });
});

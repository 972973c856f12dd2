import { describe, expect, it } from "vitest";
import { markup } from "./markup.ts";

describe("markup", () => {
  it("escapes what is put in, in text and in attributes", () => {
    const name = `"><script>alert('x')</script>&`;
    expect(markup`<p title="${name}">${name}</p>`.text).toBe(
      `<p title="&quot;&gt;&lt;script&gt;alert(&#39;x&#39;)&lt;/script&gt;&amp;">&quot;&gt;&lt;script&gt;alert(&#39;x&#39;)&lt;/script&gt;&amp;</p>`,
    );
  });

  it("takes markup as it is, joins lists, and leaves nothing for null and false", () => {
    const items = ["a", "<b>"].map((it) => markup`<li>${it}</li>`);
    expect(markup`<ul>${items}</ul>${null}${false}${0}`.text).toBe("<ul><li>a</li><li>&lt;b&gt;</li></ul>0");
  });

  it("replaces control characters, which a page can't hold", () => {
    expect(markup`${"a\u0000b\u001bc\td"}`.text).toBe("a\ufffdb\ufffdc\td");
  });
});

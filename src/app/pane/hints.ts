import { css, html } from "lit";
import type { TemplateResult } from "lit";

/** What to know on a first visit: three things, and the promise of privacy. */
export function hints(look: () => void): TemplateResult {
  return html`<div class="hints">
    <h2>Three things to know</h2>
    <ol>
      <li>
        <b>What is blue-green is yours.</b> Drag it, click and type it, or reach it with the Tab key. All the
        rest follows from it.
      </li>
      <li><b>Time is one.</b> Move the upright line over the treatment and the section goes with it.</li>
      <li>
        <b>A number comes with its doubt.</b> The ± is from the sums; the quick estimates stand under it, and
        how far they are out.
      </li>
    </ol>
    <p><button class="act" type="button" @click=${look}>Look at a solved ingot</button></p>
    <p class="aside">
      All sums are done on this machine. Nothing is sent anywhere; pull the network plug and it goes on.
    </p>
  </div>`;
}

export const hintsStyle = css`
  .hints {
    padding: var(--s-4);
  }
  .hints h2 {
    font-size: var(--t-title);
    font-weight: var(--w-firm);
    margin-bottom: var(--s-2);
  }
  .hints li {
    padding: var(--s-3) 0;
    border-top: 1px solid var(--rule);
    font-size: var(--t-ask);
    line-height: 1.36;
  }
  .hints .act {
    margin: var(--s-2) 0 var(--s-4);
  }
`;

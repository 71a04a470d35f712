/** The style sheet of the HTML report: system fonts, light and dark, and print. No outside resource. */
export const HTML_STYLE = `
:root { color-scheme: light dark; --ink: #1b1f24; --soft: #57606a; --rule: #d0d7de; --edgelaw-paper: #ffffff;
  --tint: #f3f6fa; --edgelaw-law: #1f5fa8; --edgelaw-reference: #6b7280; --edgelaw-bars: #9aa7b8; --edgelaw-data: #b3400e; }
@media (prefers-color-scheme: dark) { :root { --ink: #e6e9ed; --soft: #a3adb8; --rule: #3b434c; --edgelaw-paper: #14181d;
  --tint: #1d232b; --edgelaw-law: #7db4f0; --edgelaw-reference: #9aa4b0; --edgelaw-bars: #5d6b7c; --edgelaw-data: #f2935c; } }
* { box-sizing: border-box; }
body { margin: 0; background: var(--edgelaw-paper); color: var(--ink); font: 16px/1.55 system-ui, sans-serif; }
main { max-width: 60rem; margin: 0 auto; padding: 2rem 1.25rem 3rem; }
h1 { font-size: 1.7rem; line-height: 1.25; margin: 0 0 1rem; }
h2 { font-size: 1.2rem; margin: 2.2rem 0 .6rem; }
p { max-width: 46rem; margin: .6rem 0; overflow-wrap: anywhere; }
.answer { background: var(--tint); border-left: 4px solid var(--edgelaw-law); padding: .7rem 1rem; font-size: 1.05rem; }
.note { color: var(--soft); border-left: 4px solid var(--rule); padding: .1rem 1rem; }
.table { overflow-x: auto; margin: 1.2rem 0; }
table { border-collapse: collapse; font-variant-numeric: tabular-nums; font-size: .92rem; }
caption { text-align: left; font-weight: 600; padding-bottom: .5rem; }
th, td { padding: .3rem .8rem; border-bottom: 1px solid var(--rule); text-align: right; white-space: nowrap; }
thead th { border-bottom: 2px solid var(--soft); vertical-align: bottom; }
.left { text-align: left; white-space: normal; overflow-wrap: break-word; max-width: 24rem; }
th.error, td.error { color: var(--soft); font-weight: normal; font-size: .85em; padding-left: 0; }
tbody th { font-weight: normal; }
.small { color: var(--soft); font-size: .85rem; margin: .25rem 0; }
figure { margin: 1.6rem 0; break-inside: avoid; }
figcaption { max-width: 46rem; margin-top: .4rem; font-size: .92rem; }
figcaption b { display: block; }
svg { max-width: 100%; height: auto; color: var(--ink); }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .25rem 1.2rem; font-size: .9rem; }
dt { color: var(--soft); }
dd { margin: 0; overflow-wrap: anywhere; }
@media print { :root { color-scheme: light; --ink: #000; --soft: #444; --rule: #bbb; --edgelaw-paper: #fff; --tint: #f5f5f5;
  --edgelaw-law: #1f5fa8; --edgelaw-reference: #666; --edgelaw-bars: #9aa7b8; --edgelaw-data: #b3400e; }
  body { font-size: 11pt; } main { max-width: none; padding: 0; } .table { overflow: visible; } table { break-inside: avoid; }
  h2 { break-after: avoid; } }
`;

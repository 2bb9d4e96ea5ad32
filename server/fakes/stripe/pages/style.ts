/** Style of all hosted pages: plain and neutral, light and dark by the system's setting. */
export const PAGE_STYLE = `
:root { color-scheme: light dark; --ink: #20242b; --soft: #545c69; --line: #cfd5dd; --edge: #7c8593; --ground: #f3f4f7; --sheet: #fff; --accent: #3a4a78; --on-accent: #fff; --bad: #a4262c; --bad-ground: #fdf1f1; --notice: #fff4d6; --notice-ink: #4a3900; }
@media (prefers-color-scheme: dark) {
  :root { --ink: #e9ebef; --soft: #adb5c2; --line: #3a414d; --edge: #8b95a5; --ground: #15181d; --sheet: #1e232a; --accent: #a9b9ec; --on-accent: #12182a; --bad: #ff9ea2; --bad-ground: #3a1d20; --notice: #3b3113; --notice-ink: #ffe9a8; }
}
* { box-sizing: border-box; }
body { margin: 0; background: var(--ground); color: var(--ink); font: 16px/1.5 system-ui, sans-serif; }
header { background: var(--notice); color: var(--notice-ink); padding: .6rem 1rem; text-align: center; font-weight: 600; }
header p { margin: 0; }
main { margin: 0 auto; padding: 1.5rem 1rem 4rem; }
main.narrow { max-width: 34rem; }
main.wide { max-width: 82rem; }
h1 { font-size: 1.6rem; line-height: 1.25; margin: .25rem 0 .5rem; }
h2 { font-size: 1.15rem; margin: 2rem 0 .5rem; }
a { color: var(--accent); }
.amount { font-size: 2rem; font-weight: 650; font-variant-numeric: tabular-nums; margin: 0; }
.sheet { background: var(--sheet); border: 1px solid var(--line); border-radius: 12px; padding: 1.25rem; margin: 1rem 0; }
.sheet h2 { margin-top: 0; }
.items { list-style: none; padding: 0; margin: .5rem 0; }
.items li { display: flex; justify-content: space-between; gap: 1rem; }
.field { margin: 0 0 1rem; }
.row { display: grid; grid-template-columns: 1fr 1fr; gap: 1rem; align-items: end; }
label { display: block; font-weight: 600; }
.hint { margin: 0; color: var(--soft); font-size: .9rem; }
.error { margin: 0; color: var(--bad); font-weight: 600; }
.alert { border: 2px solid var(--bad); background: var(--bad-ground); color: var(--ink); border-radius: 8px; padding: .75rem 1rem; margin: 1rem 0; font-weight: 600; }
input { width: 100%; font: inherit; padding: .55rem .7rem; border: 1px solid var(--edge); border-radius: 8px; background: var(--sheet); color: var(--ink); }
input[aria-invalid=true] { border: 2px solid var(--bad); }
button { font: inherit; font-weight: 600; padding: .6rem 1.1rem; border: 1px solid var(--accent); border-radius: 8px; background: var(--accent); color: var(--on-accent); cursor: pointer; }
button.quiet { background: transparent; color: var(--accent); }
button.small { padding: .15rem .6rem; font-size: .9rem; background: transparent; color: var(--accent); min-height: 24px; }
.wide-button { width: 100%; }
:focus-visible { outline: 3px solid var(--accent); outline-offset: 2px; }
details { margin: 1rem 0; }
summary { cursor: pointer; color: var(--accent); font-weight: 600; }
.scroll { overflow-x: auto; border: 1px solid var(--line); border-radius: 10px; background: var(--sheet); }
table { border-collapse: collapse; width: 100%; font-size: .92rem; }
caption { text-align: left; padding: .5rem .75rem; color: var(--soft); }
th, td { text-align: left; padding: .4rem .75rem; border-top: 1px solid var(--line); vertical-align: top; white-space: nowrap; }
td.wrap { white-space: normal; min-width: 12rem; }
.number { text-align: right; font-variant-numeric: tabular-nums; }
code { font-size: .85rem; }
.actions { display: flex; flex-wrap: wrap; gap: .4rem; }
.bar { display: flex; flex-wrap: wrap; gap: .6rem; align-items: center; }
@media (max-width: 26rem) { .row { grid-template-columns: 1fr; } }
`;

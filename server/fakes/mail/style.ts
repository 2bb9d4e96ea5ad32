/** Style of the mail page: one neutral look, light and dark by the system's setting. */
export const MAIL_STYLE = `
:root { color-scheme: light dark; --ink: #1d2327; --soft: #55606a; --line: #d5dbe0; --ground: #f5f7f8; --sheet: #fff; --link: #0b5a8a; }
@media (prefers-color-scheme: dark) {
  :root { --ink: #e8ecef; --soft: #a9b4bd; --line: #37424b; --ground: #14191d; --sheet: #1c2329; --link: #84c5f0; }
}
* { box-sizing: border-box; }
body { margin: 0; background: var(--ground); color: var(--ink); font: 16px/1.5 system-ui, sans-serif; }
a { color: var(--link); overflow-wrap: anywhere; }
header { border-bottom: 1px solid var(--line); background: var(--sheet); padding: 1rem max(1rem, calc(50vw - 28rem)); }
header p { margin: 0; color: var(--soft); }
.brand { font-weight: 600; font-size: 1.1rem; color: var(--ink); text-decoration: none; }
main { max-width: 58rem; margin: 0 auto; padding: 1.5rem 1rem 4rem; }
h1 { font-size: 1.5rem; line-height: 1.25; margin: .5rem 0 1rem; overflow-wrap: anywhere; }
h2 { font-size: 1rem; margin: 1.5rem 0 .5rem; }
.bar { display: flex; flex-wrap: wrap; gap: 1rem; justify-content: space-between; margin-bottom: 1rem; }
.bar form { display: flex; flex-wrap: wrap; gap: .5rem; align-items: center; }
input { font: inherit; padding: .4rem .6rem; border: 1px solid #7b8791; border-radius: 6px; background: var(--sheet); color: var(--ink); min-width: 0; }
button { font: inherit; padding: .4rem .9rem; border: 1px solid var(--link); border-radius: 6px; background: var(--link); color: var(--sheet); cursor: pointer; }
button.quiet { background: transparent; color: var(--link); }
:focus-visible { outline: 3px solid var(--link); outline-offset: 2px; }
.messages { list-style: none; margin: 0; padding: 0; border: 1px solid var(--line); border-radius: 10px; background: var(--sheet); overflow: hidden; }
.messages li + li { border-top: 1px solid var(--line); }
.messages a { display: grid; grid-template-columns: 1fr auto; gap: .1rem 1rem; padding: .75rem 1rem; text-decoration: none; color: var(--ink); }
.messages a:hover { background: var(--ground); }
.messages a:focus-visible { outline-offset: -3px; }
.subject { font-weight: 600; overflow-wrap: anywhere; }
.people { grid-column: 1; color: var(--soft); overflow-wrap: anywhere; }
.messages time { grid-column: 2; grid-row: 1; color: var(--soft); font-variant-numeric: tabular-nums; white-space: nowrap; }
@media (max-width: 34rem) { .messages a { grid-template-columns: 1fr; } .messages time { grid-column: 1; grid-row: auto; } }
.empty { padding: 2rem; text-align: center; border: 1px dashed var(--line); border-radius: 10px; color: var(--soft); }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .2rem 1rem; margin: 0 0 1rem; }
dt { color: var(--soft); } dd { margin: 0; overflow-wrap: anywhere; }
iframe { width: 100%; height: 28rem; border: 1px solid var(--line); border-radius: 10px; background: #fff; }
.text { white-space: pre-wrap; overflow-wrap: anywhere; padding: 1rem; border: 1px solid var(--line); border-radius: 10px; background: var(--sheet); }
main > form { margin-top: 1.5rem; }
`;

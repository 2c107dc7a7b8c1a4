/** The page's style sheet: rules, white and alignment; ink is the site, blue the bank. */
export const PAGE_STYLE = `
:root { color-scheme: light dark;
  --sheet: #fbfcfa; --ink: #14202b; --soft: #505e69; --hair: #c3ccca; --bank: #0b5c99;
  --watch: #916200; --avoid: #8e0f45; --avoid-fill: #8e0f45; --on-avoid: #fbfcfa; }
@media (prefers-color-scheme: dark) { :root {
  --sheet: #10181e; --ink: #e8eef0; --soft: #a3b1b9; --hair: #3b4952; --bank: #74b8f0;
  --watch: #f2cc55; --avoid: #ff7c98; --avoid-fill: #c9316a; --on-avoid: #ffffff; } }
@font-face { font-family: "Sofia Sans Semi Condensed"; font-weight: 400; font-display: swap;
  src: url("/page/sofia-400.woff2") format("woff2"); }
@font-face { font-family: "Sofia Sans Semi Condensed"; font-weight: 600; font-display: swap;
  src: url("/page/sofia-600.woff2") format("woff2"); }
* { box-sizing: border-box; }
body { margin: 0; background: var(--sheet); color: var(--ink);
  font: 15px/21px "Sofia Sans Semi Condensed", system-ui, sans-serif; }
header, main, footer { max-width: 1016px; margin: 0 auto; padding: 0 32px; }
header { padding-top: 16px; }
header p { margin: 0 0 12px; font-size: 16px; }
header strong, header strong a { font-weight: 600; font-size: 18px; text-decoration: none; }
h1, strong, b { font-weight: 600; }
input, select, button { font: inherit; color: inherit; }
input:not([type=checkbox], [type=file], [type=hidden]), select { display: block; width: 320px; max-width: 100%; min-height: 34px;
  padding: 3px 0 4px; font-weight: 600; background: none; border: 0; border-bottom: 1.5px solid var(--ink); border-radius: 0; }
select { text-overflow: ellipsis; }
input[type=file] { max-width: 100%; padding: 4px 0; }
button, input::file-selector-button { font: inherit; font-weight: 600; color: inherit; background: none; cursor: pointer;
  border: 1.5px solid var(--ink); border-radius: 0; min-height: 34px; padding: 5px 14px; }
button.main, form[data-act] button:not(.quiet) { background: var(--ink); color: var(--sheet); }
input::file-selector-button { margin-right: 12px; }
input:focus-visible, select:focus-visible, button:focus-visible { outline: 3px solid var(--ink); outline-offset: 3px; }
td form button { min-height: 28px; padding: 2px 10px; }
.fields input:not([type=checkbox]), td select, .fields select { width: 100%; min-width: 0; }
.line { height: 5px; background: var(--ink); }
h1 { font-size: 25px; line-height: 30px; font-weight: 600; margin: 24px 0 8px; overflow-wrap: anywhere; }
h2 { font-size: 16px; line-height: 20px; font-weight: 600; margin: 0; padding-top: 12px; }
section { border-top: 1px solid var(--hair); margin-top: 24px; }
p, ul { margin: 8px 0; }
ul { padding-left: 20px; }
a { color: inherit; text-decoration: underline dotted; text-underline-offset: 4px; display: inline-block; padding: 2px 0; }
a:focus-visible { outline: 3px solid var(--ink); outline-offset: 3px; }
.soft { color: var(--soft); }
.bank { color: var(--bank); }
.verdict { font-size: 19px; line-height: 24px; font-weight: 600; display: inline-flex; align-items: center; gap: 8px; }
.verdict svg { width: 16px; height: 16px; flex: none; }
.watch { color: var(--watch); }
.avoid { background: var(--avoid-fill); color: var(--on-avoid); padding: 2px 8px; }
.verdict.avoid { font-size: 17px; }
dl { display: grid; grid-template-columns: repeat(auto-fill, minmax(150px, 1fr)); gap: 16px 24px; margin: 16px 0; }
dl div { display: flex; flex-direction: column-reverse; justify-content: flex-end; }
dt { font-size: 13px; line-height: 18px; color: var(--soft); }
dd { margin: 0; font-size: 25px; line-height: 29px; font-weight: 600; }
dd small { font-size: 15px; font-weight: 400; color: var(--soft); }
table { border-collapse: collapse; width: 100%; max-width: 500px; font-variant-numeric: tabular-nums; }
caption { text-align: left; color: var(--soft); font-size: 13px; padding: 8px 0; }
th { text-align: left; font-weight: 400; }
thead th { color: var(--soft); font-size: 13px; }
td, thead th + th { text-align: right; }
th, td { padding: 4px 8px 4px 0; border-bottom: 1px solid var(--hair); }
.field { margin: 12px 0; }
.field label { display: block; font-size: 13px; line-height: 18px; color: var(--soft); }
.field small { display: block; color: var(--soft); font-size: 13px; }
select option { background: var(--sheet); }
.people { max-width: 720px; }
.people td, .people thead th { text-align: left; }
.people form { margin: 0; }
.alert { border-left: 5px solid var(--avoid); padding: 4px 12px; max-width: 620px; }
.shown-once { border-left: 5px solid var(--ink); padding: 4px 12px; overflow-wrap: anywhere; }
.links { list-style: none; padding: 0; display: flex; flex-wrap: wrap; gap: 4px 24px; }
.links a { padding: 9px 0; }
form[data-act], form[id] { max-width: 640px; }
form label { display: block; margin: 8px 0; }
form label span { display: block; font-size: 13px; line-height: 18px; color: var(--soft); }
textarea { font: inherit; color: inherit; background: none; border: 0; border-bottom: 1px solid var(--soft); width: 100%; min-height: 52px; }
input[type=checkbox] { width: 24px; height: 24px; min-height: 24px; vertical-align: middle; accent-color: var(--ink); }
textarea:focus-visible, summary:focus-visible { outline: 3px solid var(--ink); outline-offset: 3px; }
.fields { display: grid; grid-template-columns: repeat(auto-fit, minmax(90px, 1fr)); gap: 0 16px; align-items: end; }
fieldset { min-width: 0; border: 0; border-top: 1px solid var(--hair); margin: 12px 0; padding: 8px 0; }
legend { padding: 0 8px 0 0; font-weight: 600; }
.level { font-size: 13px; font-weight: 600; padding: 1px 6px; border: 2px solid var(--ink); }
.level.blocks { background: var(--ink); color: var(--sheet); }
.drop { border: 1.5px dashed var(--ink); padding: 24px; }
.drop.over { border-style: solid; }
[role=alert]:empty, [role=status]:empty { display: none; }
.refusal { display: block; color: var(--avoid); font-size: 13px; line-height: 18px; padding-top: 4px; }
[aria-invalid=true] { border-color: var(--avoid) !important; }
[role=alert] { color: var(--avoid); font-weight: 600; }
summary { cursor: pointer; min-height: 24px; padding: 4px 0; }
.wide { max-width: none; }
ol { padding-left: 32px; }
li { overflow-wrap: anywhere; }
.wide th[scope=row] { min-width: 96px; }
.wide td, .wide th { text-align: left; overflow-wrap: anywhere; vertical-align: top; }
.scroll { overflow-x: auto; }
.scroll:focus-visible { outline: 3px solid var(--ink); outline-offset: 3px; }
.figures td { white-space: nowrap; overflow-wrap: normal; }
.figures td, .figures thead th + th { text-align: right; padding-left: 10px; }
footer { padding-bottom: 32px; }
details { margin: 12px 0; }
code { overflow-wrap: anywhere; }
@media (max-width: 719px) { button { min-height: 40px; } input:not([type=checkbox], [type=hidden]), select { min-height: 40px; } header, main, footer { padding-left: 14px; padding-right: 14px; } h1 { font-size: 21px; line-height: 26px; } }
@media print { .links { display: none; } }
`;

/** A drawing sheet like the product's own pages: hairlines, square corners, pure greys. */
export const STYLE = `
@font-face { font-family: Lato; src: url(/lato-400.woff2) format('woff2'); font-weight: 400; font-display: swap; }
@font-face { font-family: Lato; src: url(/lato-700.woff2) format('woff2'); font-weight: 700; font-display: swap; }
* { box-sizing: border-box; }
body { margin: 0; background: #f4f4f4; color: #1c1c1c; font: 16px/1.5 Lato, sans-serif; }
a { color: #1f6f64; }
a:focus-visible, summary:focus-visible { outline: 2px solid #1c1c1c; outline-offset: 2px; }
header { display: flex; flex-wrap: wrap; border-bottom: 1px solid #8a8a8a; background: #fff; }
header > * { padding: .75rem 1.25rem; border-right: 1px solid #c8c8c8; margin: 0; font-size: 1rem; }
header h1 { font-weight: 700; }
header p { color: #555; flex: 1 1 16rem; }
main { max-width: 62rem; margin: 0 auto; padding: 1.5rem 1rem 4rem; }
ol { list-style: none; margin: 0; padding: 0; border: 1px solid #8a8a8a; background: #fff; }
ol li + li { border-top: 1px solid #c8c8c8; }
ol a { display: grid; grid-template-columns: 15rem 1fr auto; gap: 0 1rem; padding: .75rem 1rem; color: inherit; text-decoration: none; }
ol a:hover { background: #ececec; }
ol a > * { min-width: 0; overflow-wrap: anywhere; }
.subject { font-weight: 700; }
time, .quiet { color: #555; }
h2 { font-size: 1.375rem; line-height: 1.3; margin: 0 0 1rem; overflow-wrap: anywhere; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .25rem 1rem; margin: 0 0 1.5rem; padding: 1rem; border: 1px solid #8a8a8a; background: #fff; }
dt { color: #555; } dd { margin: 0; overflow-wrap: anywhere; }
iframe { display: block; width: 100%; height: clamp(20rem, 60vh, 40rem); border: 1px solid #8a8a8a; background: #fff; }
pre { margin: 0; padding: 1rem; border: 1px solid #8a8a8a; background: #fff; white-space: pre-wrap; overflow-wrap: anywhere; font: inherit; }
pre.source { font: .875rem/1.5 monospace; }
h3, summary { font-size: 1rem; font-weight: 700; margin: 1.5rem 0 .5rem; }
summary { cursor: pointer; padding: .25rem 0; }
nav { display: flex; gap: 1.5rem; margin: 0 0 1rem; }
nav a { padding: .25rem 0; }
@media (max-width: 40rem) {
  ol a { grid-template-columns: 1fr; }
  dl { grid-template-columns: 1fr; gap: 0; } dd { margin-bottom: .5rem; }
}
`;

/** Style of the page: black on white, one column of plots on narrow screens, two on wide ones and on paper. */
export const reportStyle = `
:root { color-scheme: light; }
body { margin: 0; background: #fff; color: #111; font: 15px/1.45 system-ui, sans-serif; }
main { max-width: 960px; margin: 0 auto; padding: 16px 20px; }
h1 { font-size: 1.5em; } h2 { font-size: 1.25em; border-top: 2px solid #111; padding-top: 12px; } h3 { font-size: 1.1em; }
small { font-weight: normal; color: #444; }
p, li { max-width: 72em; overflow-wrap: anywhere; }
.plots { display: grid; grid-template-columns: repeat(auto-fill, minmax(340px, 1fr)); gap: 8px 24px; align-items: start; }
figure { margin: 0 0 8px; max-width: 460px; break-inside: avoid; } figcaption { font-weight: 600; }
figure.sheet { max-width: 720px; } img { display: block; width: 100%; height: auto; }
svg { display: block; width: 100%; height: auto; }
svg text { font: 12px system-ui, sans-serif; fill: #111; }
.bar { fill: #0072b2; } .line { fill: none; stroke: #0072b2; stroke-width: 2; } .axis { stroke: #777; stroke-width: 1; }
table { border-collapse: collapse; margin: 8px 0; } th, td { text-align: left; padding: 2px 14px 2px 0; border-bottom: 1px solid #ccc; }
.variant { border-left: 4px solid #d55e00; padding-left: 10px; }
@page { size: A4; margin: 15mm; }
@media print { body { font-size: 10pt; } main { max-width: none; padding: 0; } .plots { grid-template-columns: 1fr 1fr; }
h2, h3 { break-after: avoid; } tr, li { break-inside: avoid; } * { print-color-adjust: exact; } }
`;

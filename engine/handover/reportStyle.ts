/** Styles of the report, on screen and on paper. */
export const reportStyle = `
:root{color-scheme:light;--paper:#f4efe2;--ink:#1e1b16;--soft:#554d41;--hair:#cdc3ae;--fill:#d55e00;--bar:#8b8171}
*{box-sizing:border-box}
body{margin:0;background:var(--paper);color:var(--ink);font:16px/1.5 Georgia,"Times New Roman",serif}
main{max-width:62rem;margin:0 auto;padding:2rem 1.25rem 4rem}
h1{font-size:2rem;margin:0;overflow-wrap:anywhere}
h2{font-size:1.3rem;margin:2.2rem 0 .6rem;border-top:1px solid var(--ink);padding-top:.5rem}
h3{font-size:1rem;margin:1.2rem 0 .3rem}
.lead{font-size:1.1rem;margin:.4rem 0 0}
.small,small,.legend{font-size:.8125rem;color:var(--soft)}
.cautions{border-left:4px solid var(--ink);padding-left:1rem;margin-top:1.5rem}
.cautions h2{border:0;margin:0;padding:0;font-size:1rem}
.cautions ul{margin:.3rem 0;padding-left:1.1rem}
table{border-collapse:collapse;width:100%;font-variant-numeric:tabular-nums}
th,td{text-align:left;vertical-align:top;padding:.25rem .6rem .25rem 0;border-bottom:1px solid var(--hair);overflow-wrap:anywhere}
.facts th{width:13rem;font-weight:normal;color:var(--soft)}
.trials th,.trials td{overflow-wrap:normal;font-size:.875rem}
.trials .number{text-align:right;white-space:nowrap}
.trials thead th{vertical-align:bottom;border-bottom-color:var(--ink)}
.chosen th,.chosen td{font-weight:bold}
.wide{overflow-x:auto}
.pictures,.charts{display:grid;grid-template-columns:repeat(auto-fit,minmax(min(100%,18rem),1fr));gap:1.5rem;margin:1rem 0}
.charts{grid-template-columns:repeat(auto-fit,minmax(min(100%,27rem),1fr))}
figure{margin:0;break-inside:avoid}
figure img,figure svg{width:100%;height:auto;display:block}
.pictures img,.pictures svg{border:1px solid var(--ink)}
figcaption{font-size:.8125rem;color:var(--soft);margin-top:.3rem}
svg text{font:11px Georgia,serif;fill:var(--ink)}
.charts rect{fill:var(--bar)}
svg line{stroke:var(--ink);stroke-width:1}
.square{display:inline-block;width:.7rem;height:.7rem;background:var(--ink);margin:0 .3rem 0 .8rem}
.square.open{background:none;border:2px solid var(--fill)}
footer{margin-top:3rem;color:var(--soft);font-size:.8125rem}
@media (max-width:40rem){.facts th{width:8rem}}
@media print{:root{--paper:#fff}body{font-size:10.5pt}main{padding:0;max-width:none}section{break-inside:auto}h2,h3{break-after:avoid}tr{break-inside:avoid}.wide{overflow:visible}@page{margin:16mm}}
`;

import { DARK, figureStyle, LIGHT } from './figure/style.ts';

/** Look of the pages: a paper with a wide column of time on the left and what holds "now" beside it. Everything follows the reader's light or dark setting;
 *  print is always light. */
const LAYOUT = `
*{box-sizing:border-box}
html{--paper:#f6f4ef;--card:#ffffff;--ink:#1d2733;--faint:#566273;--line:#d5d1c7;--accent:#0a5a8c;--alarm:#8c2f3f;--alarm-ground:#fbeaec;--doubt:#7a5200;--doubt-ground:#fdf3dc;--calm:#3f4a57;--calm-ground:#eceff2;font:15px/1.5 ui-sans-serif,system-ui,"Segoe UI","DejaVu Sans",sans-serif;color:var(--ink);background:var(--paper)}
body{margin:0}
header,main,footer{max-width:1440px;margin:0 auto;padding:0 24px}
header{padding-top:22px}
h1{font-size:1.65rem;line-height:1.25;margin:.1em 0 .4em;overflow-wrap:anywhere}
h2{font-size:1.2rem;margin:1.9em 0 .5em;padding-top:.5em;border-top:3px double var(--line)}
h3{font-size:1rem;margin:1.2em 0 .4em}
p{margin:.4em 0;max-width:75em;overflow-wrap:anywhere}
a{color:var(--accent)}
.kind,.faint,figcaption{color:var(--faint);font-size:.88rem}
.verdict{font-size:1.15rem;padding:.7em 1em;border-left:8px solid var(--calm);background:var(--calm-ground);max-width:none}
.verdict.breaks-down{border-color:var(--alarm);background:var(--alarm-ground)}
.verdict.undecided{border-color:var(--doubt);background:var(--doubt-ground)}
.verdict strong{font-size:1.3rem;margin-right:.35em}
.breaks-down strong{color:var(--alarm)}
.undecided strong{color:var(--doubt)}
.clearance{font-weight:600;border:2px solid var(--alarm);padding:.5em .9em;max-width:none}
.skip{position:absolute;left:-999em}
.skip:focus{left:24px;top:6px;background:var(--card);padding:.3em .6em}
.pair{display:grid;grid-template-columns:minmax(0,1.05fr) minmax(0,1fr);gap:0 34px}
.card{background:var(--card);border:1px solid var(--line);border-radius:3px}
table{border-collapse:collapse;width:100%;font-size:.92rem;font-variant-numeric:tabular-nums}
caption{text-align:left;color:var(--faint);font-size:.88rem;padding:.2em 0}
th,td{text-align:left;vertical-align:top;padding:.28em .7em .28em 0;border-bottom:1px solid var(--line);overflow-wrap:anywhere}
thead th{border-bottom:2px solid var(--faint);vertical-align:bottom}
tbody th{font-weight:500}
.scroll{overflow-x:auto}
.scroll:focus-visible,:focus-visible{outline:3px solid var(--accent);outline-offset:2px}
.cautions{list-style:none;padding:0;margin:.4em 0}
.cautions li{padding:.45em 0 .45em .9em;border-left:4px solid var(--line);margin-bottom:.4em;overflow-wrap:anywhere}
.cautions li.safety{border-color:var(--alarm)}
code{font:.86em ui-monospace,"DejaVu Sans Mono",monospace}
pre{font:.86rem/1.45 ui-monospace,"DejaVu Sans Mono",monospace;background:var(--card);border:1px solid var(--line);padding:.8em;overflow:auto;max-height:34em;white-space:pre-wrap;overflow-wrap:anywhere}
details{margin:.5em 0}
summary{cursor:pointer;font-weight:600}
.rail{position:sticky;top:0;z-index:2;background:var(--paper);border-bottom:1px solid var(--line);padding:.5em 0;display:flex;flex-wrap:wrap;gap:.3em 1.2em;align-items:center}
.rail input[type=range]{flex:1 1 16em;min-width:9em;accent-color:var(--accent)}
.rail output{font-weight:700;font-variant-numeric:tabular-nums}
.rail .where{min-width:17em}
.choices{border:0;padding:0;margin:0;display:flex;flex-wrap:wrap;gap:.2em .9em;align-items:center;font-size:.92rem}
.choices legend{float:left;padding:0;margin-right:.9em;color:var(--faint)}
button,select{font:inherit;font-size:.9rem;color:var(--ink);background:var(--card);border:1px solid var(--faint);border-radius:3px;padding:.12em .6em;min-height:1.9em;cursor:pointer}
button[aria-pressed=true]{background:var(--accent);border-color:var(--accent);color:var(--card)}
.bench{display:grid;grid-template-columns:minmax(0,1.75fr) minmax(0,1fr);gap:16px 22px;align-items:start;margin-top:12px}
.now-column{display:grid;gap:12px}@media (min-height:880px){.now-column{position:sticky;top:60px}}
.time-column{display:grid;gap:12px}
.plot{margin:0;padding:6px 6px 4px;position:relative;min-width:0}
.plot svg{display:block;max-width:100%;height:auto}
.timed svg{cursor:crosshair;touch-action:pan-y}
.strip{display:block}.narrow{max-width:62em}#coefficients th:nth-child(4),#coefficients td:nth-child(4){min-width:7.5em}#coefficients th:first-child{min-width:8em}#coefficients td:nth-child(2){min-width:9em}
.strip .has{fill:var(--line)}
.strip .visited{fill:var(--accent)}
.strip .outside{fill:var(--alarm)}
.badge{white-space:nowrap}
.points svg{cursor:pointer}.point{padding:8px 12px}.point h3{margin-top:0}label select{max-width:16em}
footer{padding-top:1em;padding-bottom:3em;color:var(--faint);font-size:.88rem}
.number{white-space:nowrap}
@media (max-width:1050px){.bench{grid-template-columns:minmax(0,1fr)}.now-column{position:static;grid-template-columns:repeat(auto-fit,minmax(min(100%,340px),1fr))}}
@media (max-width:860px){.pair{grid-template-columns:minmax(0,1fr)}}
@media (max-width:600px){header,main,footer{padding-left:12px;padding-right:12px}h1{font-size:1.3rem}.verdict{font-size:1rem;padding:.6em .7em}.rail{gap:.2em .7em}.rail .where{min-width:0}.plot{padding:4px 2px}th,td{padding-right:.5em}.number{white-space:normal}.stack thead{position:absolute;left:-999em}.stack tr{display:block;padding:.4em 0;border-bottom:1px solid var(--line)}.stack th,.stack td{display:block;border:0;padding:.1em 0}.stack td[data-label]:not(:empty)::before{content:attr(data-label) ": ";color:var(--faint)}.stack td:empty{display:none}}
`;

const DARK_PAGE =
  'html{--paper:#0e141a;--card:#141b23;--ink:#e6ebf0;--faint:#a5b1bf;--line:#344150;--accent:#74c4f0;--alarm:#f0a3ad;--alarm-ground:#2d171c;--doubt:#f0c674;--doubt-ground:#2a2210;--calm:#a5b1bf;--calm-ground:#1b242e}';

const PRINT = `
@media print{html{font-size:11px;background:#fff}.rail,.skip,.no-print{display:none}.bench,.pair{display:block}.now-column{position:static;display:block}.plot,tr,.cautions li{break-inside:avoid}.plot{margin-bottom:8px;border:0}h2,h3{break-after:avoid}pre{max-height:none}header,main,footer{padding:0}.scroll{overflow:visible}}
`;

export const pageStyle: string = `${LAYOUT}${figureStyle(LIGHT)}
@media screen and (prefers-color-scheme:dark){${DARK_PAGE}
${figureStyle(DARK)}}${PRINT}`;

import { colourVariables } from "../look/palette.ts";

/** The page's look: a sheet of paper by day, a dark one by night, always paper in print. */
export const pageStyle: string = `
:root{color-scheme:light dark;${colourVariables("light")}}
@media (prefers-color-scheme:dark){:root{${colourVariables("dark")}}}
@media print{:root{color-scheme:light;${colourVariables("light")}}}
*{box-sizing:border-box}
html{-webkit-text-size-adjust:100%;scroll-behavior:smooth}
@media (prefers-reduced-motion:reduce){html{scroll-behavior:auto}}
body{margin:0;background:var(--paper);color:var(--ink);font:16px/1.55 Charter,"Bitstream Charter","Iowan Old Style",Georgia,"DejaVu Serif",serif;overflow-wrap:break-word}
main{max-width:1180px;margin:0 auto;padding:0 20px 80px}
p,ul,dl{max-width:74ch}
h1,h2,h3,h4{line-height:1.25;text-wrap:balance;font-weight:700}
h1{font-size:clamp(1.7rem,5vw,2.7rem);font-weight:400;margin:.15em 0 .4em;letter-spacing:-.01em}
h1 b{font-weight:700;white-space:nowrap}
@media (max-width:560px){h1 b{white-space:normal}}
h2{font-size:1.45rem;margin:2.6em 0 .6em;padding-top:.7em;border-top:2px solid var(--ink)}
h3{font-size:1.15rem;margin:2.4em 0 .4em;font-weight:400;font-style:italic}
h4{font-size:1rem;margin:0 0 .6em}
a{color:inherit}
code,.mono{font:.8em/1.45 "DejaVu Sans Mono",Menlo,Consolas,monospace;overflow-wrap:anywhere}
.skip{position:absolute;left:-999px}.skip:focus{left:8px;top:8px;background:var(--paper);padding:6px 10px;z-index:9}
:focus-visible{outline:3px solid var(--stepper0);outline-offset:2px}
.verdict{padding-top:36px}
.case{margin:0;font-size:1.05rem}
.soft,.title,caption,figcaption{color:var(--soft)}
.lead{font-size:1.2rem;margin:.2em 0 1em}
.facts{list-style:none;margin:1.4em 0;padding:0;display:flex;flex-wrap:wrap;gap:12px 36px;max-width:none}
.facts li{max-width:17ch;line-height:1.3;color:var(--soft);font-size:.92rem}
.facts .figure{display:block;font-size:1.55rem;color:var(--ink);white-space:nowrap}
.answer{font-size:1.1rem}
.holds{color:var(--stepper2)}.fails{color:var(--limit)}
td .holds,td .fails{white-space:nowrap}
.contents{margin:28px 0 0;padding:10px 0;border-block:1px solid var(--rule);font-size:.95rem}
.contents ul{list-style:none;margin:0;padding:0;display:flex;flex-wrap:wrap;gap:4px 22px;max-width:none}
.contents a{display:inline-block;padding:3px 0}
table{border-collapse:collapse;width:100%;font-size:.93rem;line-height:1.4;margin:.8em 0}
caption{text-align:left;padding-bottom:6px;font-size:.9rem}
th,td{text-align:left;vertical-align:top;padding:8px 14px 8px 0;border-bottom:1px solid var(--rule)}
th{font-weight:400}thead th{color:var(--soft);font-size:.85rem;vertical-align:bottom;border-bottom:1px solid var(--ink)}
tbody th{font-weight:700}
.number{text-align:right;font-variant-numeric:tabular-nums}
.title{display:block;font-weight:400;font-size:.86rem}
td[data-heading^=binding]{min-width:10em}
.rank{display:inline-block;min-width:1.5em;color:var(--soft);font-weight:400}
.marked th,.marked td{background:color-mix(in srgb,var(--stepper0) 9%,transparent)}
.marked th{box-shadow:inset 4px 0 var(--stepper0);padding-left:10px}
.gauge{display:inline-flex;align-items:center;gap:8px;white-space:nowrap}
.gauge svg{width:90px;height:10px;flex:none}
.gauge .track{fill:var(--rule)}.gauge .fill{fill:var(--stepper0)}.gauge .design{fill:var(--ink)}.gauge.over .fill{fill:var(--limit)}
.unseen{position:absolute;width:1px;height:1px;overflow:hidden;clip-path:inset(50%);white-space:nowrap}
details{margin:.6em 0}summary{cursor:pointer;padding:6px 0}
dl.why div,dl.facts-list div{display:grid;grid-template-columns:minmax(9em,16em) 1fr;gap:2px 18px;padding:5px 0;border-bottom:1px solid var(--rule)}
dl{margin:.6em 0}dt{font-weight:700}dd{margin:0;min-width:0}
.legend{position:relative;background:var(--paper);padding:10px 0;border-bottom:1px solid var(--rule);font-size:.9rem}
@media (min-width:900px) and (min-height:600px){.legend{position:sticky;top:0;z-index:3;max-height:45vh;overflow:auto}}
.chips{display:flex;flex-wrap:wrap;gap:6px}
.chips button{font:inherit;color:inherit;background:none;border:1px solid var(--others);border-radius:3px;padding:4px 10px;min-height:32px;display:inline-flex;gap:8px;align-items:center;cursor:pointer}
.chips button:disabled{cursor:default;opacity:1}
.chips .all{border-style:dashed}.chips .all:disabled{display:none}
.chips [aria-pressed=true]{background:var(--ink);color:var(--paper);border-color:var(--ink)}
.chips [aria-pressed=true] svg{background:var(--paper)}
.figures{display:grid;gap:34px 40px;grid-template-columns:repeat(auto-fit,minmax(min(100%,330px),1fr));align-items:start}
.figures.wide>:first-child{grid-column:1/-1}
#chart-orbit-in-the-plane{max-width:660px}
.whole,code span{display:inline-block;max-width:100%}
figure{margin:0;min-width:0;scroll-margin-top:120px}
figcaption{font-size:.88rem;line-height:1.5;margin-top:.5em;max-width:80ch}
.drawing{min-height:120px;overflow:hidden}
.drawing svg{display:block;max-width:100%;height:auto}
.input{font-size:.9rem;margin:.4em 0}.input form,.input .vega-bind{margin:0}
.input label,.input .vega-bind{display:flex;flex-wrap:wrap;align-items:center;gap:4px 10px}
.input input{font:inherit;color:inherit;background:var(--paper);accent-color:var(--stepper0);max-width:100%}
.input input[type=number]{width:8em;border:1px solid var(--soft);border-radius:3px;padding:4px 8px;min-height:32px}
.input input[type=range]{width:min(20em,100%);min-height:32px}
#tip{position:fixed;z-index:10;max-width:min(460px,calc(100vw - 24px));background:var(--paper);color:var(--ink);border:1px solid var(--ink);padding:8px 12px;font-size:.85rem;line-height:1.4;pointer-events:none;box-shadow:3px 3px 0 var(--rule)}
#tip.held{pointer-events:auto}#tip[hidden]{display:none}
#tip dl{margin:0}#tip div{display:grid;grid-template-columns:8.5em 1fr;gap:10px}#tip dt{font-weight:400;color:var(--soft)}
@media screen and (max-width:720px){
main{padding:0 16px 60px}
thead{position:absolute;width:1px;height:1px;overflow:hidden;clip-path:inset(50%)}
table,tbody,tr,th,td,caption{display:block;width:auto}
tr{padding:10px 0;border-bottom:1px solid var(--rule)}
th,td{border:0;padding:2px 0}
td{display:grid;grid-template-columns:9.5em 1fr;gap:10px}td>*{min-width:0}
td[data-heading^=worst]{display:block;margin-top:4px}
td[data-empty]{display:none}
td::before{content:attr(data-heading);color:var(--soft)}
td[data-heading^=worst]::before{content:"worst case: "}
.number{text-align:left}
.marked{box-shadow:inset 4px 0 var(--stepper0);padding-left:12px}.marked th{box-shadow:none;padding-left:0}.marked th,.marked td{background:none}
dl.why div,dl.facts-list div{grid-template-columns:1fr}
}
@media print{
@page{margin:14mm}
body{font-size:10.5pt}main{max-width:none;padding:0}
.contents,.skip,#tip,.input,.chips .all{display:none}
.legend{position:static}.legend details{display:none}
table{font-size:8.5pt}thead th{font-size:8pt}th,td{padding:5px 8px 5px 0}.gauge svg{width:50px}td[data-heading^=binding]{min-width:7em}
.figures,.figures.wide{grid-template-columns:repeat(2,minmax(0,1fr));gap:18px 20px}
figure,tr{break-inside:avoid}h2,h3,h4{break-after:avoid}
}
`;

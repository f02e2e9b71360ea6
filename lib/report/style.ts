/**
 * The look of the report. Past is deep water, what is to come is warm sand: apart in hue for most eyes, in lightness
 * and line style for all. Contrasts meet WCAG 2.2 AA in both schemes.
 */
export const style = `
:root{--paper:#f6f4ee;--card:#fffdf8;--ink:#12262e;--soft:#4a5b62;--rule:#d9d5c9;--grid:#ebe7dc;--water:#0b5563;--water-pale:#cfe3e4;--sand:#a8480f;--fan1:#f6dcc6;--fan2:#edbf99;--stone:#5f6b70;--alarm:#9b1c3f;--p1:#0b3d48;--p2:#2f7f8d;--p3:#8abfc5;--p4:#e4dccb}
@media screen and (prefers-color-scheme:dark){:root{--paper:#0d181d;--card:#13232a;--ink:#e8ecea;--soft:#a9b9bd;--rule:#2c4049;--grid:#20333b;--water:#74c7d3;--water-pale:#1c434b;--sand:#f2a76b;--fan1:#45301f;--fan2:#6b4526;--stone:#a3afb3;--alarm:#ff8fa8;--p1:#d8f1f3;--p2:#74c7d3;--p3:#3a8391;--p4:#3f4b4c}}
*{box-sizing:border-box}
html{-webkit-text-size-adjust:100%}
body{margin:0;background:var(--paper);color:var(--ink);font:16px/1.5 system-ui,-apple-system,"Segoe UI",sans-serif;overflow-wrap:anywhere}
header,main,footer{max-width:72rem;margin:0 auto;padding:0 1.25rem}
header{padding-top:1.5rem}
h1,h2,h3,.mark,.name{font-family:Charter,"Iowan Old Style",Georgia,"Times New Roman",serif}
.mark{margin:0;color:var(--water);font-size:1.05rem;letter-spacing:.06em}
.tide{display:block;width:100%;height:44px;overflow:visible}
.tide path{fill:none;stroke:var(--water);stroke-width:2;vector-effect:non-scaling-stroke}
h1{margin:.4rem 0 0;font-weight:500;font-size:clamp(1.5rem,4.5vw,2.3rem);line-height:1.2}
.when,.hint{margin:.3rem 0 0;color:var(--soft)}
h2{margin:0;font-weight:500;font-size:1.45rem;line-height:1.25}
h3{margin:1.6rem 0 0;padding-top:.8rem;border-top:1px solid var(--grid);font-weight:500;font-size:1.05rem}
h3 small{margin-left:.5em}
a{color:var(--water)}
:focus-visible{outline:3px solid var(--sand);outline-offset:2px}
.troubles{margin-top:1.5rem;border-left:4px solid var(--alarm);padding:.2rem 0 .2rem 1rem}
.front{margin-top:1.75rem}
.front ol{list-style:none;margin:.75rem 0 0;padding:0;border-top:1px solid var(--rule)}
.front li{border-bottom:1px solid var(--rule)}
.front a,.front .row{display:grid;grid-template-columns:minmax(8rem,1.1fr) 6.5rem minmax(8rem,1.2fr) minmax(14rem,1.6fr);gap:.15rem 1.25rem;align-items:center;padding:.6rem .25rem;color:inherit;text-decoration:none}
.front a:hover{background:var(--card)}
.name{font-size:1.15rem}
small,.of{font:400 .85rem/1.3 system-ui,-apple-system,"Segoe UI",sans-serif;color:var(--soft)}
.name small,.of{display:block}
.next small{display:block}
.news{grid-column:1/-1;color:var(--soft)}
.news::first-letter{text-transform:uppercase}
.mini{width:100%;height:34px}
.chip{display:inline-block;font:600 .8rem/1 system-ui,-apple-system,"Segoe UI",sans-serif;padding:.35em .6em;border-radius:1em;border:1.5px solid var(--stone);color:var(--ink);justify-self:start;vertical-align:middle;white-space:nowrap}
.chip::before{content:"– ";font-weight:400}
.chip.changed{background:var(--ink);border-color:var(--ink);color:var(--paper)}
.chip.changed::before{content:"◆ "}
.chip.surprised{border-color:var(--sand)}
.chip.surprised::before{content:"● ";color:var(--sand)}
.chip.late,.chip.limit{border-color:var(--alarm)}
.chip.late::before{content:"▲ ";color:var(--alarm)}
.chip.limit::before{content:"▬ ";color:var(--alarm)}
.tiles{display:flex;flex-wrap:wrap;gap:.75rem 2.5rem;margin:1rem 0}
.tiles dt{font-size:.85rem;color:var(--soft)}
.tiles dd{margin:0}
.tiles b{font:500 1.9rem/1.15 Charter,"Iowan Old Style",Georgia,"Times New Roman",serif}
.tiles small{display:block}
.series{margin:2rem 0;padding:1.25rem;background:var(--card);border:1px solid var(--rule);border-radius:.6rem;content-visibility:auto;contain-intrinsic-size:auto 1600px}
.said{margin:.6rem 0;padding:0 0 0 1.1rem;max-width:70ch}
.said li{margin:.2rem 0}
.pictures{display:grid;grid-template-columns:repeat(auto-fit,minmax(min(100%,19rem),1fr));gap:.5rem 2rem}
.plot{margin:1.2rem 0 .4rem;min-width:0}
figcaption{font-weight:600;font-size:.95rem;margin-bottom:.7rem}
.frame{position:relative;padding:0 .6rem 1.5rem calc(var(--gutter) + .6rem);font-size:.78rem;color:var(--soft);font-variant-numeric:tabular-nums}
.body{position:relative}
.body svg{display:block;width:100%;height:var(--height);overflow:visible}
.frame svg path,.mini path{vector-effect:non-scaling-stroke;fill:none}
.marks{position:relative}
.marks b{position:absolute;color:var(--ink);line-height:1.3}
.ys{position:absolute;right:calc(100% + .5rem);top:0;bottom:0;width:var(--gutter)}
.ys span{position:absolute;right:0;transform:translateY(-50%);white-space:nowrap}
.xs{position:relative;height:0}
.xs span{position:absolute;top:.3rem;white-space:nowrap}
.mid{transform:translateX(-50%)}
.to{transform:translateX(-100%)}
.grid{stroke:var(--grid);stroke-width:1}
.past{stroke:var(--water);stroke-width:1.8;stroke-linejoin:round}
.coming{stroke:var(--sand);stroke-width:2.2;stroke-dasharray:5 3}
.frame svg .fan{stroke:none}.frame svg .fan1{fill:var(--fan1)}.frame svg .fan2{fill:var(--fan2)}
.limit{stroke:var(--alarm);stroke-width:1.5;stroke-dasharray:2 3}
.half{stroke:var(--stone);stroke-width:1.5;stroke-dasharray:2 3}
.boundary{stroke:var(--alarm);stroke-width:2.4;stroke-dasharray:9 4}
.reference{stroke:var(--stone);stroke-width:1.8;stroke-dasharray:6 4}
.now{stroke:var(--rule);stroke-width:1}
.zero{stroke:var(--stone);stroke-width:1}
.change{stroke:var(--ink);stroke-width:1.2;stroke-dasharray:1 3}
.frame svg .between{fill:var(--grid);stroke:none}
.frame svg .ebb{fill:var(--water-pale);stroke:none}
.dot{stroke:var(--water);stroke-width:8;stroke-linecap:round}
.dot.old{stroke:var(--stone);stroke-width:7;stroke-linecap:square}
.dot.surprise{stroke:var(--alarm);stroke-width:9}
.whisker,.stem{stroke:var(--water);stroke-width:2.4}
.frame svg .part{stroke:var(--stone);stroke-width:.8}
.frame svg .part1{fill:var(--p1)}.frame svg .part2{fill:var(--p2)}.frame svg .part3{fill:var(--p3)}.frame svg .part4{fill:var(--p4)}
.legend,.told{margin:.3rem 0;padding:0;font-size:.82rem;color:var(--soft)}
.legend{list-style:none;display:flex;flex-wrap:wrap;gap:.15rem 1rem}
.told{list-style:upper-alpha;padding-left:1.6rem;color:var(--ink)}
.legend i{display:inline-block;width:1.4rem;height:.7rem;margin-right:.4rem;border:0 solid transparent;vertical-align:-.05rem}
.legend i.past,.legend i.coming,.legend i.limit,.legend i.half,.legend i.boundary,.legend i.reference,.legend i.stem{height:0;border-top:2px solid var(--water);vertical-align:.25rem}
.legend i.coming{border-top:2px dashed var(--sand)}
.legend i.limit{border-top:2px dotted var(--alarm)}
.legend i.half{border-top:2px dotted var(--stone)}
.legend i.boundary{border-top:2.5px dashed var(--alarm)}
.legend i.reference{border-top:2px dashed var(--stone)}
.legend i.stem{width:.2rem;height:.8rem;border:0;background:var(--water);vertical-align:-.1rem}
.legend i.dot{width:.55rem;height:.55rem;border-radius:50%;background:var(--water)}
.legend i.dot.old{border-radius:0;background:var(--stone)}
.legend i.fan1{background:var(--fan1)}.legend i.fan2{background:var(--fan2)}.legend i.between{background:var(--grid)}
.legend i[class^=part]{outline:1px solid var(--stone);outline-offset:-1px}
.legend i.part1{background:var(--p1)}.legend i.part2{background:var(--p2)}.legend i.part3{background:var(--p3)}.legend i.part4{background:var(--p4)}
.back{margin:.8rem 0 0;font-size:.85rem}
details{font-size:.85rem}
summary{cursor:pointer;color:var(--soft);padding:.25rem 0}
.scroll,pre{overflow:auto;max-height:24rem;border:1px solid var(--rule);border-radius:.3rem}
pre{padding:.8rem;line-height:1.45;font-size:.85rem}
table{border-collapse:collapse;font-variant-numeric:tabular-nums;width:100%}
th,td{padding:.2rem .6rem;text-align:right;white-space:nowrap;border-bottom:1px solid var(--grid);font-weight:400}
th:first-child{text-align:left}
thead th{font-weight:600;border-bottom-color:var(--rule)}
footer{padding-top:1rem;padding-bottom:2.5rem;color:var(--soft);font-size:.9rem}
@media(max-width:46rem){
.xs .more{display:none}
header,main,footer{padding-left:.9rem;padding-right:.9rem}
.front a,.front .row{grid-template-columns:1fr auto;gap:.3rem .75rem}
.front .mini{grid-column:1/-1}.front .next{grid-column:1/-1}
.series{margin:1.25rem -.35rem;padding:.9rem .75rem}
}
@media print{
:root{--paper:#fff;--card:#fff;--ink:#000;--soft:#333}
body{font-size:10.5pt}.series{border:0;padding:0;content-visibility:visible}.plot{break-inside:avoid}details:not([open]){display:none}
.series{break-before:page}.back{display:none}.pictures{grid-template-columns:repeat(3,minmax(0,1fr));gap:.4rem 1.2rem}.pictures .body svg{height:calc(var(--height)*.75)}.plot{font-size:.9em}*{print-color-adjust:exact;-webkit-print-color-adjust:exact}
}
`;

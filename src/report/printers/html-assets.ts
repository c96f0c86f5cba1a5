/** Style and script of the HTML report. */

export const STYLE = `
:root{color-scheme:light dark;--ink:#1a1a1a;--soft:#5a5a5a;--paper:#fff;--panel:#f5f6f8;--rule:#d4d7dc;--link:#0b5394;--yes:#00704f;--no:#b34700;--open:#7a5c00}
@media (prefers-color-scheme:dark){:root{--ink:#e8e8e6;--soft:#a9adb3;--paper:#17191c;--panel:#212429;--rule:#3a3f46;--link:#7fb8ee;--yes:#4cc79d;--no:#f0935a;--open:#e0bd55}}
*{box-sizing:border-box}
body{margin:0 auto;max-width:74rem;padding:1.5rem;color:var(--ink);background:var(--paper);font:1rem/1.5 system-ui,-apple-system,"Segoe UI",sans-serif;display:grid;grid-template-columns:12rem minmax(0,1fr);grid-template-areas:"header header" "nav main";gap:0 2.5rem}
header{grid-area:header;overflow-wrap:anywhere}
h1{margin:0;font-size:1.8rem;line-height:1.2}
.subtitle{margin:.2rem 0 1.2rem;color:var(--soft)}
nav{grid-area:nav;position:sticky;top:1rem;align-self:start;font-size:.9rem}
nav h2{font-size:.8rem;text-transform:uppercase;letter-spacing:.06em;color:var(--soft);margin:.3rem 0;border:0}
nav ol{list-style:none;margin:0;padding:0}
nav li{margin:.3rem 0}
main{grid-area:main;min-width:0}
a{color:var(--link)}
a:focus-visible,button:focus-visible,[tabindex]:focus-visible{outline:2px solid var(--link);outline-offset:2px}
.skip{position:absolute;left:-999rem}
.skip:focus{left:1rem;top:.5rem;background:var(--paper);padding:.3rem .6rem;z-index:1}
h2{font-size:1.25rem;margin:2.2rem 0 .7rem;padding-bottom:.2rem;border-bottom:1px solid var(--rule)}
p,dd,li,figcaption,caption{overflow-wrap:anywhere}
.headline{background:var(--panel);border-left:.35rem solid var(--soft);border-radius:.3rem;padding:.8rem 1.1rem}
.headline.yes{border-color:var(--yes)}.headline.no{border-color:var(--no)}.headline.open{border-color:var(--open)}
.answer{font-size:1.1rem;margin:.2rem 0 .8rem}
.yes .answer strong{color:var(--yes)}.no .answer strong{color:var(--no)}.open .answer strong{color:var(--open)}
dl{margin:.5rem 0}
dl div{display:grid;grid-template-columns:11rem minmax(0,1fr);gap:0 1rem;padding:.12rem 0}
dt{color:var(--soft)}dd{margin:0}
.table{overflow-x:auto;margin:1rem 0}
table{border-collapse:collapse;font-size:.95rem}
caption{text-align:left;color:var(--soft);padding-bottom:.4rem;font-size:.9rem}
th,td{padding:.25rem .8rem .25rem 0;text-align:left;vertical-align:baseline}
td:not(:last-child),th:not(:last-child){padding-right:1.4rem}
thead th{border-bottom:1.5px solid var(--ink);font-weight:600}
tbody tr{border-bottom:1px solid var(--rule)}
.right{text-align:right}.center{text-align:center}
th button{all:unset;cursor:pointer;font-weight:600}
th button:focus-visible{outline:2px solid var(--link)}
th[aria-sort=ascending] button::after{content:" \\2191"}
th[aria-sort=descending] button::after{content:" \\2193"}
.display{overflow-x:auto;margin:.7rem 0;padding:.2rem 0}
.display.long{padding-left:2.5rem;text-indent:-2.5rem;line-height:2.1}
.display.long math{text-indent:0}
.matrices{display:flex;flex-wrap:wrap;gap:0 2.5rem}
math{font-size:1.05em}
figure{margin:1.2rem 0;overflow-x:auto}
figure svg{max-width:100%;height:auto;color:var(--ink);display:block}
figcaption,.caution,.note{color:var(--soft);font-size:.9rem}
.cite{white-space:nowrap}
@media (max-width:52rem){body{display:block}nav{position:static}dl div{grid-template-columns:1fr}}
@media print{:root{--ink:#000;--soft:#444;--paper:#fff;--panel:#fff;--rule:#bbb;--link:#000;--yes:#000;--no:#000;--open:#000}body{display:block;max-width:none;padding:0;font-size:10pt}nav,.skip{display:none}.headline{border:1px solid #000}h2{break-after:avoid}figure,tr,.display{break-inside:avoid}.table,.display,figure{overflow:visible}a{text-decoration:none}}
`;

/** Sorts the rows of a table by the column whose head is pressed; numbers as numbers, fractions too. */
export const SCRIPT = `
"use strict";
(function(){
function number(key){
var m=/^[^0-9-]{0,3}(-?[0-9.]+(?:e[-+]?[0-9]+)?)(?:\\/([0-9.]+))?/i.exec(key.replace(/[[(]/g,""));
return m?Number(m[1])/Number(m[2]||1):NaN;
}
function compare(a,b){
var x=number(a),y=number(b);
if(!isNaN(x)&&!isNaN(y)&&x!==y)return x-y;
return a.localeCompare(b,"en",{numeric:true});
}
document.querySelectorAll("table.sortable").forEach(function(table){
var heads=Array.prototype.slice.call(table.tHead.rows[0].cells);
heads.forEach(function(head,k){
head.querySelector("button").addEventListener("click",function(){
var down=head.getAttribute("aria-sort")==="ascending";
heads.forEach(function(h){h.removeAttribute("aria-sort");});
head.setAttribute("aria-sort",down?"descending":"ascending");
var body=table.tBodies[0];
var rows=Array.prototype.slice.call(body.rows);
rows.sort(function(a,b){
var order=compare(a.cells[k].getAttribute("data-key"),b.cells[k].getAttribute("data-key"));
return down?-order:order;
});
rows.forEach(function(row){body.appendChild(row);});
});
});
});
})();
`;

import { themeKey } from './choice.ts';
import { type Role, light, night } from './tokens.ts';
import { family } from './type.ts';

const variables = (palette: Readonly<Record<Role, string>>): string =>
  Object.entries(palette)
    .map(([role, value]) => `--${role}:${value};`)
    .join('');

/**
 * The stylesheet of every exported page: both palettes as variables, and what inline styles cannot say (focus, hover,
 * print). No theme is baked in: the system decides until `data-theme` says otherwise. Paper is always light.
 */
export const stylesheet = `
:root{color-scheme:light;${variables(light)}}
@media (prefers-color-scheme:dark){:root:not([data-theme=light]){color-scheme:dark;${variables(night)}}}
:root[data-theme=night]{color-scheme:dark;${variables(night)}}
html{background:var(--ground);-webkit-text-size-adjust:100%;scroll-padding-block:96px}
body{background:var(--ground);color:var(--ink);font-family:${family.reading};margin:0}
#root{min-height:100%}
*,*::before,*::after{box-sizing:border-box}
:focus-visible{outline:3px solid var(--cold)!important;outline-offset:2px}
svg text{font-variant-numeric:tabular-nums}
a{color:inherit;text-decoration:none}
main:focus{outline:none!important}
/* two simple selectors, so that they stand above react-native-web's own classes */
:root [data-look~=words]{font:inherit;color:inherit;text-align:inherit;white-space:inherit}
:root [data-look~=control]{font-family:${family.reading};font-size:17px;line-height:24px;color:var(--ink);background:var(--sheet);border:1px solid var(--ink);border-radius:3px;min-height:48px;padding:11px 12px;width:100%;margin:0;appearance:none}
:root [data-look~=control]::placeholder{color:var(--softInk);opacity:1}
:root [data-look~=control]:disabled,:root [data-look~=control][readonly]{background:transparent;border-style:dashed}
:root [data-look~=control][aria-invalid=true]{border:2px solid var(--wrong);padding:10px 11px}
:root select[data-look~=control]{padding-right:40px;text-overflow:ellipsis;background-image:linear-gradient(45deg,transparent 50%,var(--ink) 50%),linear-gradient(135deg,var(--ink) 50%,transparent 50%);background-position:right 20px center,right 14px center;background-size:6px 6px;background-repeat:no-repeat}
:root [data-look~=button]{display:inline-flex;flex-direction:row;flex-shrink:1;align-items:center;justify-content:center;font-family:${family.readingStrong};font-size:17px;line-height:22px;min-height:48px;min-width:48px;padding:12px 18px;border-radius:3px;border:1px solid var(--ink);background:transparent;color:var(--ink);cursor:pointer;text-align:center;margin:0}
:root [data-look~=button]:hover{background:var(--touched)}
:root [data-look~=button][data-look~=main]{background:var(--ember);border-color:var(--ember);color:var(--onEmber)}
:root [data-look~=button][data-look~=main]:hover{background:var(--emberDeep);border-color:var(--emberDeep)}
:root [data-look~=button][data-look~=quiet]{border-color:transparent;text-decoration:underline;text-decoration-color:var(--softInk);text-underline-offset:4px;padding-inline:10px}
:root [data-look~=button][data-look~=large]{font-size:20px;line-height:26px;min-height:64px;padding:16px 22px}
:root [data-look~=button][data-look~=gloved]{font-size:22px;line-height:28px;min-height:96px;padding:20px 24px}
:root [data-look~=button]:disabled{cursor:default;opacity:1;color:var(--softInk);background:transparent;border:1px dashed var(--softInk)}
:root [data-look~=row]{text-align:left}
:root [data-look~=row]:hover{background:var(--touched)}
:root [data-look~=tick]{appearance:none;flex:none;width:28px;height:28px;margin:0;border:2px solid var(--ink);border-radius:3px;background:var(--sheet);display:grid;place-content:center;cursor:pointer}
:root [data-look~=tick][type=radio]{border-radius:50%}
:root [data-look~=tick]::before{content:"";width:14px;height:14px;transform:scale(0);background:var(--ink)}
:root [data-look~=tick][type=checkbox]::before{width:16px;height:16px;clip-path:polygon(12% 46%,2% 58%,40% 92%,98% 18%,84% 8%,38% 68%)}
:root [data-look~=tick][type=radio]::before{border-radius:50%}
:root [data-look~=tick]:checked::before{transform:scale(1)}
:root [data-look~=tick]:disabled{border-style:dashed;cursor:default}
:root [data-look~=segment]{position:relative;display:inline-flex;flex:1 1 auto}
:root [data-look~=segment] input{position:absolute;inset:0;opacity:0;margin:0;width:100%;height:100%;cursor:pointer}
:root [data-look~=segment] span{flex:1;display:flex;align-items:center;justify-content:center;min-height:48px;padding:8px 14px;border:1px solid var(--ink);margin-left:-1px;background:var(--sheet);color:var(--ink);text-align:center;font-family:${family.readingMedium};font-size:16px;line-height:20px}
:root [data-look~=segment]:first-child span{border-radius:3px 0 0 3px;margin-left:0}
:root [data-look~=segment]:last-child span{border-radius:0 3px 3px 0}
:root [data-look~=segment] input:checked+span{background:var(--ink);color:var(--ground);text-decoration:underline;text-underline-offset:4px}
:root [data-look~=segment] input:focus-visible+span{outline:3px solid var(--cold);outline-offset:2px;z-index:1}
:root [data-look~=segment] input:disabled+span{border-style:dashed;color:var(--softInk)}
:root [data-look~=segment] input:disabled:checked+span{color:var(--ground)}
:root [data-look~=link]{font:inherit;color:inherit;text-decoration:underline;text-decoration-color:var(--softInk);text-underline-offset:3px}
:root [data-look~=dialog]{background:var(--sheet);color:var(--ink);border:1px solid var(--ink);border-radius:3px;padding:20px;width:min(560px,calc(100vw - 32px));max-height:calc(100dvh - 32px);overflow:auto;margin:auto}
:root [data-look~=dialog]::backdrop{background:var(--veil)}
:root [data-look~=skip]{position:absolute;left:8px;top:-80px;z-index:20;background:var(--sheet);color:var(--ink);padding:13px 16px;border:1px solid var(--ink)}
:root [data-look~=skip]:focus{top:8px}
@keyframes cp-run{from{transform:translateX(-100%)}to{transform:translateX(300%)}}
:root [data-look~=running]{animation:cp-run 1.4s linear infinite}
@media (prefers-reduced-motion:reduce){:root [data-look~=running]{animation-duration:6s}}
@page{margin:12mm}
@media print{:root,:root[data-theme]{color-scheme:light;${variables({ ...light, ground: '#FFFFFF', sheet: '#FFFFFF', ink: '#000000', softInk: '#333333' })}}[data-print=hide]{display:none!important}}
`;

/** Runs before the first paint so that a chosen theme never flashes; its hash is in the page's content policy. */
export const themeScript = `try{var t=localStorage.getItem(${JSON.stringify(themeKey)});if(t==='light'||t==='night')document.documentElement.dataset.theme=t}catch(e){}`;

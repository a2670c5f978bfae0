import { chromium } from '@playwright/test'
const base='http://localhost:3195', out='/tmp/wt/sets/codes/shots'
async function main(){
  const b=await chromium.launch({executablePath:'/usr/bin/chromium',args:['--no-sandbox','--disable-gpu','--disable-quic','--no-first-run','--disable-background-networking','--disable-component-update','--disable-sync']})
  const ctx=await b.newContext({viewport:{width:1440,height:900}}); const p=await ctx.newPage(); p.setDefaultTimeout(180000)
  await p.goto(base+'/sign-in'); await p.getByLabel('Name').fill('r.adeyemi'); await p.getByLabel('Password').fill('quietpaper'); await p.getByRole('button',{name:'Sign in'}).click(); await p.waitForURL(u=>!u.pathname.startsWith('/sign-in'))
  await p.goto(base+'/'); const href=await p.getByRole('link',{name:/to try the scan/}).first().getAttribute('href'); const id=href!.split('/')[2]
  const book=process.argv[2]??id
  await p.goto(`${base}/papers/${book}/print`); await p.waitForLoadState('networkidle'); await p.screenshot({path:out+'-0.png'})
  await p.getByRole('button',{name:'Find a free place'}).click(); await p.waitForTimeout(500); await p.getByText('Looking at the page').waitFor({state:'hidden'}); 
  for (const [w,h] of [[1440,900],[1024,768],[820,1180]] as const){ await p.setViewportSize({width:w,height:h}); await p.waitForTimeout(500); await p.screenshot({path:`${out}-${w}.png`}) }
  await p.setViewportSize({width:1440,height:900})
  const code=p.getByRole('button',{name:/^The code of page/}); await code.focus(); for(let k=0;k<6;k++) await p.keyboard.press('Shift+ArrowDown'); await p.waitForTimeout(4000); await p.screenshot({path:out+'-bad.png'})
  console.log(id, await p.locator('[role=alert]').allTextContents())
  await b.close()
}
main()

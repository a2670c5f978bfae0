/** Sets light or dark before the first paint: the person's choice, or what the machine prefers. */
const script = `try{var t=localStorage.getItem('sheafmark-theme')}catch(e){}document.documentElement.dataset.theme=t||(matchMedia('(prefers-color-scheme: dark)').matches?'dark':'light')`

export function ThemeScript() {
  return <script dangerouslySetInnerHTML={{ __html: script }} />
}

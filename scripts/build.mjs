// npm run build: builds when the sources changed since the last build.
import { buildIfChanged, checkNode, installPackages } from './set-up.mjs'

checkNode()
installPackages()
if (!buildIfChanged()) console.log('The build is up to date.')

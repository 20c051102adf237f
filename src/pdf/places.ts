/** Where a browser that prints may be: named by the caller, or installed in one of the usual places. */
import { accessSync, constants, statSync } from 'node:fs'
import { delimiter, join } from 'node:path'

/** What the search looks at; a test hands in another machine. */
export interface Machine {
  readonly platform: string
  readonly arch: string
  readonly environment: Readonly<Record<string, string | undefined>>
  readonly isProgram: (path: string) => boolean
}

export const thisMachine: Machine = {
  platform: process.platform,
  arch: process.arch,
  environment: process.env,
  isProgram: path => {
    try {
      accessSync(path, constants.X_OK)
      return statSync(path).isFile()
    } catch {
      return false
    }
  },
}

/** Quickest to start first. */
const onPath = [
  'chrome-headless-shell',
  'chromium-headless-shell',
  'google-chrome-stable',
  'google-chrome',
  'chrome',
  'chromium',
  'chromium-browser',
  'microsoft-edge-stable',
  'microsoft-edge',
  'msedge',
]

const inApplications = [
  'Google Chrome.app/Contents/MacOS/Google Chrome',
  'Chromium.app/Contents/MacOS/Chromium',
  'Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
]

const inProgramFiles = [
  ['Google', 'Chrome', 'Application', 'chrome.exe'],
  ['Chromium', 'Application', 'chrome.exe'],
  ['Microsoft', 'Edge', 'Application', 'msedge.exe'],
]

/** Programs of Chrome, Chromium and Edge on this machine, each path once, the one to try first in front. */
export function installedBrowsers(machine: Machine): readonly string[] {
  return [...new Set(placesOf(machine))].filter(machine.isProgram)
}

/** The program of that path; a name without a folder is looked for on the PATH. */
export function programNamed(name: string, machine: Machine): string | undefined {
  const places = /[\\/]/.test(name) ? [name] : foldersOnPath(machine).map(folder => join(folder, name))
  return places.find(machine.isProgram)
}

const foldersOnPath = ({ environment }: Machine): readonly string[] =>
  (environment.PATH ?? '').split(delimiter).filter(folder => folder !== '')

function placesOf(machine: Machine): readonly string[] {
  const { platform, environment } = machine
  const folders = foldersOnPath(machine)
  if (platform === 'win32') {
    const roots = ['PROGRAMFILES', 'PROGRAMFILES(X86)', 'LOCALAPPDATA'].flatMap(name => environment[name] ?? [])
    return [
      ...roots.flatMap(root => inProgramFiles.map(path => join(root, ...path))),
      ...onPath.flatMap(name => folders.map(folder => join(folder, `${name}.exe`))),
    ]
  }
  const applications = environment.HOME === undefined ? [] : [join(environment.HOME, 'Applications')]
  const bundles = ['/Applications', ...applications].flatMap(folder => inApplications.map(path => join(folder, path)))
  // A desktop leaves these out of the PATH of what it starts.
  const usual = ['/usr/bin', '/usr/local/bin', '/snap/bin', '/opt/google/chrome', '/opt/microsoft/msedge']
  return [
    ...(platform === 'darwin' ? bundles : []),
    ...onPath.flatMap(name => [...folders, ...usual].map(folder => join(folder, name))),
  ]
}

/** The host as the window sees it: every answer is checked against the contract before anything is made of it. */
import type { HostCall } from '../contract/channels'
import { isCommandId } from '../contract/commands'
import type { Host } from '../contract/host'
import { REPLIES } from '../contract/messages'

export function checkedHost(host: Host): Host {
  const checked = <Name extends HostCall>(name: Name): Host[Name] =>
    (async (...args: readonly unknown[]) => {
      const call = host[name] as (...args: readonly unknown[]) => Promise<unknown>
      const reply: unknown = await call(...args).catch((error: unknown) => refusal(name, String(error)))
      const parsed = REPLIES[name].safeParse(reply)
      return parsed.success ? parsed.data : refusal(name, 'the host answered in a way that the window does not know')
    }) as unknown as Host[Name]
  const calls = Object.keys(REPLIES) as HostCall[]
  return {
    kind: host.kind,
    can: host.can,
    ...(Object.fromEntries(calls.map((name) => [name, checked(name)])) as unknown as Pick<Host, HostCall>),
    onCommand: (listener) => host.onCommand((command) => void (isCommandId(command) && listener(command))),
    onFilesWaiting: (listener) => host.onFilesWaiting(() => listener()),
  }
}

function refusal(argument: string, why: string) {
  return { ok: false, problem: { kind: 'bad-argument', argument, why } } as const
}

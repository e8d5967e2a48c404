import type { TonightKind } from '@/components/tonight/sentences'

const CUP =
  'After the last flush let the pump stop. Then put a cup of water in each bowl: a wet seal leaks far less, and a cup lasts the night.'
const BREAKER =
  'Or switch the pump off at its own breaker until morning, and tell the crew: nobody can flush then. Never a breaker that feeds a bilge pump.'
const SHOP = 'Or ask the shop for a visit. The leak that runs the pump at night is there by day too.'
const FLUSH =
  'Flush once, last thing, and let the pump stop before you turn in. Then put a cup of water in each bowl.'

/** What to do tonight, in the order to try it. Empty when there is nothing to do. */
export function adviceFor(kind: TonightKind): string[] {
  switch (kind) {
    case 'likely':
    case 'short-cycling':
      return [CUP, BREAKER, SHOP]
    case 'flush-last':
    case 'probably-quiet':
      return [FLUSH]
    case 'running-on':
      return [
        'Look whether a toilet is hanging open: flush each one once and watch whether it closes.',
        'If the pump still does not stop, switch it off at its own breaker and tell everybody aboard. Never a breaker that feeds a bilge pump.',
        'Ask the shop for a visit before it is used again.',
      ]
    case 'off':
      return [
        'If you switched it off, nothing is wrong. Say so below, and you are not asked again.',
        'If nobody did, look at the pump’s own breaker. A breaker that trips again needs the shop, not a third try.',
      ]
    case 'unheard':
      return ['On board, look whether the logger’s light is on and whether it has a signal.']
    case 'laid-up':
    case 'worked-on':
    case 'away':
    case 'learning':
    case 'quiet':
      return []
  }
}

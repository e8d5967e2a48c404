import type { Theme } from '@/components/shell/preferences'
import { ThemeSelect } from '@/components/shell/theme-select'
import { UnitsSelect } from '@/components/shell/units-select'

/** What this program is not, at the foot of every sheet; on a phone also how it is read. */
export function Footer({ theme }: { theme: Theme }) {
  return (
    <footer data-shell className="sheet mt-auto border-t border-line py-4 text-note text-ink-2">
      <div className="mb-3 flex gap-3 text-body sm:hidden">
        <UnitsSelect />
        <ThemeSelect initial={theme} />
      </div>
      Middlewatch measures; it does not certify. A monitor is no substitute for a bilge or gas alarm.
    </footer>
  )
}

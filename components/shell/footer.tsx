/** What this program is not, at the foot of every sheet. */
export function Footer() {
  return (
    <footer data-shell className="sheet mt-auto border-t border-line py-4 text-note text-ink-2">
      Middlewatch measures; it does not certify. A monitor is no substitute for a bilge or gas alarm.
    </footer>
  )
}

import { Caution } from '@/components/ui/sheet-states'

/** Where losing vacuum, sewage gas and open hoses can hurt someone, in the order of the work. */
export function BeforeYouGoCautions() {
  return (
    <div className="mt-4">
      <Caution>
        <ul className="grid list-disc gap-1.5 pl-4">
          <li>
            Losing vacuum starts the pump. Before anything comes off: off at its own breaker, locked or
            tagged, shore power and inverter too; never a breaker that feeds a bilge pump. Tell everybody
            aboard.
          </li>
          <li>
            Sewage gas kills, and the nose stops smelling it: ventilate, never into a tank, never alone.
            Gloves, eyes and cuts covered.
          </li>
          <li>
            Vent the vacuum and expect liquid. Seacock shut before a hose below the waterline opens. No heat
            gun where there may be fuel vapour.
          </li>
          <li>
            Before the pump runs again: discharge open to a tank with room and a clear vent, seacocks as
            found. Local codes and the maker’s instructions come first.
          </li>
        </ul>
      </Caution>
    </div>
  )
}

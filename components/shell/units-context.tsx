'use client'

import { createContext, useCallback, useContext, useMemo, useState, type ReactNode } from 'react'
import { keepPreference, UNITS_COOKIE, unitsText } from '@/components/shell/preferences'
import { DEFAULT_UNITS, type UnitChoice } from '@/shared/units'

type UnitsValue = { units: UnitChoice; setUnits: (units: UnitChoice) => void }
const UnitsContext = createContext<UnitsValue>({ units: DEFAULT_UNITS, setUnits: () => undefined })

/** Holds the reader's units for everything beneath; `initial` comes from the cookie. */
export function UnitsProvider({ initial, children }: { initial: UnitChoice; children: ReactNode }) {
  const [units, setState] = useState(initial)
  const setUnits = useCallback((next: UnitChoice) => {
    setState(next)
    keepPreference(UNITS_COOKIE, unitsText(next))
  }, [])
  const value = useMemo(() => ({ units, setUnits }), [units, setUnits])
  return <UnitsContext.Provider value={value}>{children}</UnitsContext.Provider>
}

export const useUnits = (): UnitsValue => useContext(UnitsContext)

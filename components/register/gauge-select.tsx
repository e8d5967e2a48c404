import type { Gauge } from '@/components/register/gauge'
import { SelectField } from '@/components/ui/select-field'

/** Which hand gauge: how fine it can be read is part of every result. */
export function GaugeSelect({ value, choose }: { value: Gauge; choose: (gauge: Gauge) => void }) {
  return (
    <SelectField
      label="Hand gauge"
      value={value}
      onChange={(event) => choose(event.target.value === 'digital' ? 'digital' : 'dial')}
    >
      <option value="dial">Dial, read to half a division</option>
      <option value="digital">Digital, to a tenth</option>
    </SelectField>
  )
}

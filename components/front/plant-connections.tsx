import { classNames } from '@/components/ui/class-names'
import type { Direction } from '@/lib/balance/problem'
import { plant } from './plant'
import { GroupRow, label } from './plant-group'

const wash: Record<Direction, string> = {
  in: 'bg-linear-to-b from-brook-wash to-transparent',
  out: 'bg-linear-to-t from-brook-wash to-transparent',
}

/** What goes into and comes out of each unit, in the columns of the table above. */
export function PlantConnections() {
  return (
    <tbody>
      <GroupRow>Connections</GroupRow>
      {plant.units.map((unit) => {
        const links: Readonly<Record<string, Direction>> = plant.links[unit.id]
        return (
          <tr key={unit.id} className="h-[27px] text-sm">
            <th scope="row" className={classNames(label, 'font-normal')}>
              {unit.id} <span className="text-2xs text-ink-3 max-sm:block">{unit.name}</span>
            </th>
            <td className="hidden border-e border-b border-hair px-2 text-2xs text-ink-3 sm:table-cell">{unit.kind}</td>
            {plant.streams.map((stream) => {
              const way = links[stream.id]
              return (
                <td
                  key={stream.id}
                  className={classNames(
                    'border-e border-b border-hair text-center text-xs font-semibold last:border-e-0',
                    way && wash[way],
                  )}
                >
                  {way}
                </td>
              )
            })}
          </tr>
        )
      })}
    </tbody>
  )
}

/** Shots and taps of one trace as the fit has them, beside what picking the peak after each would give. */
import { eventNames, throwUnit, timeWords } from '../../plots/traceWords.ts';
import type { TraceEventTold, TraceTold } from '../../reduction/traceResults.ts';
import { plain, withPlusMinus } from '../../units/format.ts';
import { siUnit } from '../../units/units.ts';
import { PERCENT } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';

const SHOWN = 200;
const ONE = siUnit('number');

/** "−0.4 %": picked against fitted. */
const offBy = ({ jump, picked }: TraceEventTold): string => (jump === null || picked === null || jump.value === 0 ? '—' : plain(Math.abs(picked) / Math.abs(jump.value) - 1, PERCENT, 2));

export function EventTable({ told }: { readonly told: TraceTold }) {
  const { events, spacing } = told;
  const unit = throwUnit(told, 0);
  const names = eventNames(events);
  return (
    <>
      <SheetTable label={`Shots and taps of ${told.name}`}>
        <thead>
          <tr>
            <th scope="col">Event</th>
            <th scope="col">Time ± u</th>
            <th scope="col">Throw ± u</th>
            <th scope="col">Step of position, in its u</th>
            <th scope="col">By the peak alone</th>
            <th scope="col">Peak against fit</th>
          </tr>
        </thead>
        <tbody>
          {events.slice(0, SHOWN).map((event) => (
            <tr key={event.id}>
              <th scope="row">{names.get(event.id)}</th>
              <td className="num">{event.timeU === null ? timeWords(event.time, spacing) : withPlusMinus(event.time, event.timeU, siUnit('time'))}</td>
              <td className="num">{event.jump === null ? '—' : withPlusMinus(event.jump.value, event.jump.u, unit)}</td>
              <td className="num">{event.jump === null ? '—' : event.timeU !== null ? 'in its time' : plain(event.stepInU, ONE, 2)}</td>
              <td className="num">{event.picked === null ? '—' : plain(event.picked, unit, 5)}</td>
              <td className="num">{offBy(event)}</td>
            </tr>
          ))}
        </tbody>
      </SheetTable>
      <p className="quiet">
        A swing has no step of position; where the fit may move a strike’s time it is taken up by the time. The throw is what a small swing from rest without damping would show; the impulse bit follows from it. The peak alone is the first maximum of what
        the strike added to the swing before it, damping taken out: a few samples where the fit uses them all, so that noise and hum move it more; none is had where the next strike comes first.
        {events.length > SHOWN ? ` The first ${SHOWN} of ${events.length} stand here; all are in the per-shot table.` : ''}
      </p>
    </>
  );
}

// The key `people`: who prepared, reviewed and approved. One person cannot check their own work.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { listOf, located, object, type ReadBy, type Reading, required, text } from './fields.ts'
import type { Person, Role } from './study.ts'

const person = located(object({
  id: required(text({ describe: 'Short id, used by exclusions', example: 'ak' })),
  name: required(text({ describe: 'Printed name' })),
  position: required(text({ describe: 'Position in the laboratory' })),
}, { describe: 'One person' }))

const persons = listOf(person, { describe: 'One person or a list', single: true, minimum: 1 })

export const peopleReader = object({ prepared: required(persons), reviewed: required(persons), approved: required(persons) }, { describe: 'Who signs, in which role' })

export function peopleOf(read: ReadBy<typeof peopleReader>): Readonly<Record<Role, readonly Person[]>> {
  const of = (role: Role): readonly Person[] => read[role].map((each) => ({ ...each.value, place: each.place }))
  return { prepared: of('prepared'), reviewed: of('reviewed'), approved: of('approved') }
}

export function checkPeople(people: Readonly<Record<Role, readonly Person[]>>, reading: Reading): void {
  const everyone = [...people.prepared, ...people.reviewed, ...people.approved]
  everyone.forEach((each, index) => {
    const namesake = everyone.slice(0, index).find((other) => other.id === each.id && other.name !== each.name)
    if (namesake === undefined) return
    reading.report(diagnostic('definition/duplicate-name', `Unexpected second person with the id \`${each.id}\``, { place: each.place, actual: each.name, expected: 'an id for each person', mend: 'Give one of them another id', related: [{ message: `the first, ${namesake.name}`, place: namesake.place }] }))
  })
  for (const role of ['reviewed', 'approved'] as const) for (const each of people[role]) {
    const own = people.prepared.find((other) => other.id === each.id || other.name === each.name)
    if (own === undefined) continue
    reading.report(diagnostic('definition/same-person', `Unexpected \`${each.id}\` under \`${role}\`: the same person prepared the report`, { place: each.place, actual: each.id, expected: 'another person than the one who prepared it', mend: 'Name another person', related: [{ message: 'prepared by', place: own.place }] }))
  }
}

const PLACES: { where: string; what: string }[] = [
  {
    where: 'On board',
    what: 'Know before supper whether the night will be quiet, and what to do when it will not.',
  },
  {
    where: 'In the shop',
    what: 'Every connected boat on one scale, the worst on top. Ring the owner before the owner rings you.',
  },
  {
    where: 'In the bilge',
    what: 'Where the gauge goes next, why there, and how sure that makes you. No signal needed.',
  },
  {
    where: 'Fitting a logger',
    what: 'Claim it by its code, check it against a hand gauge, and leave it proven.',
  },
]

/** Who it is for, by the place they stand in. */
export function Places() {
  return (
    <ul className="mt-10 grid gap-x-8 gap-y-6 border-t-[1.5px] border-ink pt-5 sm:grid-cols-2 xl:grid-cols-4">
      {PLACES.map((place) => (
        <li key={place.where}>
          <h2>{place.where}</h2>
          <p className="mt-1 text-ink-2">{place.what}</p>
        </li>
      ))}
    </ul>
  )
}

'use client'

import Link from 'next/link'

/** Whoever manages several shops picks one; the address keeps it. */
export function ShopChoice({
  shops,
  shopId,
  path,
}: {
  shops: readonly { id: string; name: string }[]
  shopId: string
  path: string
}) {
  if (shops.length < 2) return null
  return (
    <nav aria-label="Your shops" className="mb-4 flex flex-wrap gap-5 border-b border-line">
      {shops.map((shop) => (
        <Link
          key={shop.id}
          href={`${path}?shop=${shop.id}`}
          aria-current={shop.id === shopId ? 'page' : undefined}
          className="inline-flex min-h-11 items-center border-b-2 border-transparent text-ink-2 no-underline hover:text-ink aria-[current=page]:border-ink aria-[current=page]:font-semibold aria-[current=page]:text-ink"
        >
          {shop.name}
        </Link>
      ))}
    </nav>
  )
}

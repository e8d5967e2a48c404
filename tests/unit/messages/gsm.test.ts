import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { firstThatFits, gsmLength, shorten, TEXT_LIMIT, toGsm } from '@/lib/messages/gsm'
import { replyWord } from '@/lib/messages/reply-words'

describe('the alphabet of text messages', () => {
  it('keeps what it has and drops accents it has not', () => {
    expect(toGsm('Åse, Ñandú, Čmelák')).toBe('Åse, Ñandu, Cmelak')
    expect(toGsm('“Renée’s” – 6×…')).toBe('"Renée\'s" - 6x...')
    expect(toGsm('海鸥')).toBe('??')
  })

  it('counts brackets and the euro sign double', () => {
    expect(gsmLength('a€[')).toBe(5)
  })

  it('is never left, whatever the text', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 400 }), (text) => {
        const fitted = firstThatFits([text])
        expect(gsmLength(fitted)).toBeLessThanOrEqual(TEXT_LIMIT)
        expect(toGsm(fitted)).toBe(fitted)
      }),
    )
  })

  it('cuts with two full stops, and takes the longest wording that fits', () => {
    expect(shorten('Saltmarsh Hare', 10)).toBe('Saltmars..')
    expect(shorten('Hare', 4)).toBe('Hare')
    expect(firstThatFits(['x'.repeat(161), 'short enough', 'short'])).toBe('short enough')
    expect(firstThatFits([])).toBe('')
  })
})

describe('replies', () => {
  it.each([
    ['OK', 'OK'],
    [' ok. ', 'OK'],
    ['Visit please!', 'VISIT'],
    ['laid up', 'LAIDUP'],
    ['Stop', 'STOP'],
    ['UNSUBSCRIBE', 'STOP'],
    ['unstop', 'START'],
    ['Info', 'HELP'],
    ['mute it for now', 'MUTE'],
    ['off', 'OFF'],
    ['Thanks a lot', null],
    ['', null],
    ['👍', null],
  ])('%j says %s', (body, word) => {
    expect(replyWord(body)).toBe(word)
  })
})

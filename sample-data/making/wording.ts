import type { Draws } from './seeded-draws.ts'
import type { Topic } from './story.ts'

/** Places that exist only here. */
const places = ['Ostrin', 'Velmay', 'Quarnholm', 'Tessaray', 'Ulvanish', 'Port Brennoch', 'Marrowick', 'Fennaquay']
const days = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday']
const asides = ['again', 'for once', 'as ever', 'this time', 'today', 'on the way back', 'with the whole family', 'with the van', 'in the rain', 'before breakfast', 'on the late sailing', 'of all days']

/** What is said of a topic: negative, neutral, positive. */
const sayings: Record<Topic, readonly (readonly string[])[]> = {
  booking: [
    ['the app lost my booking', 'the booking page froze at the last step', 'no seat shown, yet half the deck was empty'],
    ['changed my booking in the app', 'booked two cars and a trailer', 'the app asks for the plate number now'],
    ['booking took a minute', 'the app moved us to an earlier boat without fuss', 'refund came the same evening'],
  ],
  fares: [
    ['the fare has crept up once more', 'that is a lot to pay for a short crossing', 'two fares for one small trailer'],
    ['the car fare is the same as last month', 'looked up the return fare', 'the fare table has a new column'],
    ['the resident fare makes a difference', 'good value for a crossing like that', 'children went free'],
  ],
  onboard: [
    ['the lounge was cold and crowded', 'the tea had run out', 'half the seats were wet'],
    ['sat on the upper deck', 'the cafe was open', 'there is a new map in the lounge'],
    ['the soup on board was splendid', 'warm lounge and a window seat', 'spotless deck and a fine view'],
  ],
  punctuality: [
    ['the boat was late and nobody said why', 'missed the bus because the ferry left late', 'the new timetable leaves an hour of nothing'],
    ['the boat left at its usual time', 'the timetable changes next week', 'waiting at the slip for the next boat'],
    ['left on the minute', 'early into harbour', 'caught the connection with time to spare'],
  ],
  staff: [
    ['the crew waved us off without a word', 'nobody at the desk could help', 'a gruff answer at the ramp'],
    ['the crew are in new jackets', 'two people on the desk', 'the mate took the tickets'],
    ['the crew could not have been kinder', 'the purser found my lost glove', 'a deckhand carried the pram'],
  ],
  weather: [
    ['cancelled for wind once more and no word of the next', 'a rough crossing and no warning', 'stranded overnight by the swell'],
    ['the evening boat may be called off for wind', 'swell at the harbour mouth', 'the fog signal was on'],
    ['a rough sea and a very steady boat', 'they called the storm right and told us early', 'sailed as soon as the wind dropped'],
  ],
}

/** An invented sentence about a topic in the tone of a grade (0 negative, 1 neutral, 2 positive). */
export function sentence(topic: Topic | '', tone: number, draws: Draws): string {
  const saying = draws.pick(topic === '' ? ['the ferry was a ferry', 'crossed with Skerrow Ferries'] : sayings[topic][tone])
  const time = `${String(5 + draws.integer(17)).padStart(2, '0')}.${String(draws.integer(12) * 5).padStart(2, '0')}`
  const from = draws.pick(places)
  const to = draws.pick(places.filter((place) => place !== from))
  const body = `${draws.pick(days)}'s ${time} from ${from} to ${to}: ${saying} ${draws.pick(asides)}`
  const mark = draws.weighted([8, 1, 1])
  return mark === 0 ? body : mark === 1 ? `${body}, "${draws.pick(['honestly', 'well', 'so it goes'])}"` : `${body}\nMore later.`
}

/** The text that is copied in the storm of October 2026. */
export const stormText = "Skerrow's winter timetable cuts the last boat home from Ostrin. Share this until somebody at the harbour office reads it."

/** The same words as a copy is often seen: a handle in front, a link behind, other spacing or case. */
export function copyOf(text: string, handle: string, draws: Draws): string {
  const spaced = draws.chance(0.3) ? text.replaceAll(' ', '  ') : text
  const cased = draws.chance(0.2) ? spaced.toUpperCase() : spaced
  const front = draws.chance(0.5) ? `@${handle} ` : ''
  const link = draws.chance(0.5) ? ` https://example.org/${draws.integer(46656).toString(36)}` : ''
  return `${front}${cased}${link}`
}

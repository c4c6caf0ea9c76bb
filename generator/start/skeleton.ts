import { furtherKeys } from './further-keys.ts'
import { yamlText } from './yaml-text.ts'

/** account.yaml of an account whose mentions are not there yet: what has to be filled in is left empty, so that `check` names it. */
export function skeletonText(account: string, brand: string): string {
  return `# An account to be filled in: \`tareline check\` names what is still missing, line by line. Paths are relative to this folder.

account: ${account}   # a short name: letters, digits, hyphens
brand: ${yamlText(brand)}   # from the name of this folder: write it as people know it
locale: en-GB   # language of the review, and how figures and dates are written
time_zone: UTC   # how a time without offset is read, and where a day begins; name yours, such as Europe/Lisbon
grid: week   # the step of the time axis: day, week (from Monday) or month
reporting: month   # what one review covers: month, quarter or week
# base: { from: 2025-01-01, to: 2025-12-31 }   # what "since base" compares with; left out, the first 12 months of mentions
interval: 0.9   # probability inside every interval of the review

# Put the files into the folder mentions: .csv, .csv.gz, .parquet or .ndjson. \`tareline start FOLDER --from FILE\` proposes all this from a file.
mentions:
  - files: mentions/*.csv
    # Our name on the left, the name in the header of your file on the right.
    columns:
      posted_at:   # needed: ISO 8601, or seconds or milliseconds since 1970; for other forms see time_format
      venue:   # needed: the kind of place
      score:   # needed: a label, or a number of a range
      # author: user   # one handle in one venue is one author
      # topic: theme
      # id: ref   # finds repeats
      # thread: conversation
      # reply_to: parent
      # brand: about   # leaves other brands' rows out
      # segment: customer_type
      # text: body   # finds reposts, and is written nowhere
    # time_format: '%d.%m.%Y %H:%M'
    score: { labels: { negative: -1, neutral: 0, positive: 1 } }   # or { range: [1, 5] }

# Your names for venues and topics, and the spellings in the files that mean them.
# venues: { boards: { label: Discussion boards, values: [forum, board] } }
# topics: { fares: { label: Fares, values: [fares, prices] } }

${furtherKeys}`
}

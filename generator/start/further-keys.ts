/** The rest of what an account may say, as comments: every line is valid once its hash is taken away and the files are there. */
export const furtherKeys = `# What follows is optional: take away the hash in front of what you need.

# factors: [venue, topic, poster]     # what opinion is adjusted for; any mapped column may join
# posters: { occasional: 1, regular: 5 }   # most posts in 90 days of an occasional and of a regular author
# smallest_group: 10                  # groups of fewer authors are not shown
# target_mix: { poster: { occasional: 0.5, regular: 0.3, prolific: 0.2 } }   # whom opinion is stated for; left out, the base's mix
# A venue may also have \`cost_per_author: 3\`, what one more author heard there costs, and \`drift: none\` where it stands still.

# The survey that opinion is held against: wave, field_start, field_end, metric, segment, base, value, kind (share or mean), sd
# survey: { files: survey/*.csv, headline: favourability, lags: [-8, 16] }
# Who the customers are: margin (a mapped column such as segment), level, share
# benchmark: { files: benchmark/*.csv }
# customers: 310000                   # how many there are
# Posts judged by people beside what the coder said: venue, true_label, coded_label, count (\`check --audit-sample N\` draws which)
# coding_audit: { files: audit/*.csv }
# How much each topic matters to customers: topic, weight; or a row a respondent with overall and a column for each topic
# importance: { files: importance/*.csv }
# What happened when: date, label, kind
# events: { files: events/*.csv }
# A series of your own, such as sales: date, value, market
# outcome: { files: outcome/*.csv }

# template: template.md               # a review file of your own
# theme: theme.yaml                   # its looks
# words: words.yaml                   # your own wording of single messages
# notes: notes                        # a folder with the analyst's words for a period, such as notes/2026-10.md
# prepared_by: Name, desk
# reviewed_by: Name, role
# one_person_seals: true              # one person may do both; left out, a review is sealed by two
`

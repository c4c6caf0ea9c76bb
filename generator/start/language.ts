import { wordsOf } from './column-names.ts'

/** Where a review could be written in the file's language, and what of the file is in it. */
export interface LocaleProposal {
  readonly locale: string
  /** In words, for the account file. */
  readonly reason: string
}

/** Words of column names and labels by language, without accents; one that several languages share stands in each. The last three have no catalogue, and keep a file of theirs from being taken for a neighbour's. */
const words: Readonly<Record<string, string>> = {
  German: 'datum zeit zeitpunkt uhrzeit veroffentlicht erstellt geschrieben quelle kanal plattform seite netzwerk stimmung tonalitat bewertung sterne autor autorin verfasser benutzer nutzer benutzername mitglied thema kategorie rubrik nummer kennung gesprach diskussion antwort marke firma unternehmen kundengruppe zielgruppe inhalt nachricht beitrag kommentar sprache positiv negativ gut schlecht',
  French: 'heure publie cree date plateforme canal note notation etoiles tonalite auteur utilisateur pseudo membre theme sujet categorie identifiant fil discussion reponse marque entreprise client texte contenu commentaire langue avis positif negatif neutre bon mauvais',
  Portuguese: 'data hora publicado criado quando fonte canal plataforma meio sentimento tom nota pontuacao estrelas avaliacao autor autora usuario utilizador membro tema assunto categoria topico identificador conversa resposta marca empresa cliente texto conteudo mensagem comentario lingua idioma positivo negativo neutro bom mau',
  Spanish: 'fecha hora publicado creado fuente sitio canal plataforma medio sentimiento tono nota puntuacion estrellas valoracion autor autora usuario miembro tema asunto categoria identificador conversacion hilo respuesta marca empresa cliente texto contenido mensaje comentario idioma positivo negativo neutro bueno malo',
  Italian: 'data ora pubblicato fonte canale piattaforma sentimento tono nota punteggio stelle autore utente membro tema argomento categoria discussione risposta marca azienda cliente testo contenuto commento lingua positivo negativo neutro buono cattivo',
  Dutch: 'datum tijd geplaatst bron kanaal waardering sterren auteur gebruiker thema onderwerp categorie nummer gesprek antwoord merk bedrijf klant tekst bericht taal positief negatief neutraal goed slecht',
}

const locales: Readonly<Record<string, string>> = { German: 'de-DE', French: 'fr-FR', Portuguese: 'pt-PT' }
const usual: LocaleProposal = { locale: 'en-GB', reason: 'language of the review, and how figures and dates are written: en, de, fr or pt' }

/**
 * The locale that the words of a file speak for: at least two of a language that has a catalogue, and more than of any other.
 *
 * @param columns - their names in the file
 * @param labels - of scores, as the file spells them
 * @param timeFormat - strptime form of its times: a day and a month parted by points say as much as one word of German
 * @example proposeLocale(['Datum', 'Quelle'], ['gut', 'schlecht'], null).locale // => 'de-DE'
 */
export function proposeLocale(columns: readonly string[], labels: readonly string[], timeFormat: string | null): LocaleProposal {
  const said = [...new Map([...columns, ...labels].map((text) => [wordsOf(text).join(' '), text.trim()])).values()]
  const counted = Object.entries(words).map(([language, known]) => {
    const own = new Set(known.split(' '))
    const found = said.filter((text) => wordsOf(text).some((word) => own.has(word)))
    return { language, found: language === 'German' && timeFormat?.startsWith('%d.%m.') === true ? [...found, 'dates such as 31.12.'] : found }
  }).sort((a, b) => b.found.length - a.found.length)
  const [most, second] = counted
  const locale = locales[most!.language]
  if (locale === undefined || most!.found.length < 2 || most!.found.length === second!.found.length) return usual
  const brazilian = locale === 'pt-PT' && said.some((text) => wordsOf(text).includes('usuario'))
  return { locale: brazilian ? 'pt-BR' : locale, reason: `language of the review, as that of the file: ${most!.found.slice(0, 4).join(', ')}` }
}

/** Our columns that can be proposed, in the order in which an account lists them; the first three are needed. */
export const roles = ['posted_at', 'venue', 'score', 'author', 'topic', 'id', 'thread', 'reply_to', 'brand', 'segment', 'text'] as const
export type Role = (typeof roles)[number]
export const neededRoles: readonly Role[] = ['posted_at', 'venue', 'score']

/** Plain words for each column in English, German, French, Spanish, Portuguese, Italian and Dutch, without accents. */
const names: Readonly<Record<Role, readonly string[]>> = {
  posted_at: [
    'posted at', 'posted', 'published', 'created', 'written', 'date', 'time', 'datetime', 'timestamp', 'day', 'when', 'datum', 'zeit', 'zeitpunkt', 'uhrzeit', 'veroffentlicht', 'erstellt',
    'geschrieben', 'fecha', 'hora', 'publicado', 'creado', 'data', 'criado', 'quando', 'heure', 'publie', 'cree', 'date de publication', 'fecha de publicacion', 'data de publicacao', 'pubblicato', 'ora', 'tijd', 'geplaatst',
  ],
  venue: [
    'venue', 'source', 'site', 'platform', 'channel', 'network', 'medium', 'media', 'place', 'quelle', 'kanal', 'plattform', 'seite', 'netzwerk', 'fuente', 'sitio', 'canal', 'plataforma', 'medio',
    'fonte', 'meio', 'plateforme', 'piattaforma', 'canale', 'bron', 'kanaal',
  ],
  score: [
    'score', 'sentiment', 'tone', 'tonality', 'polarity', 'rating', 'stars', 'mark', 'stimmung', 'tonalitat', 'bewertung', 'sterne', 'note', 'notation', 'etoiles', 'tonalite', 'sentimiento', 'tono', 'puntuacion',
    'estrellas', 'valoracion', 'sentimento', 'tom', 'nota', 'pontuacao', 'estrelas', 'avaliacao', 'punteggio', 'stelle', 'waardering', 'sterren',
  ],
  author: [
    'author', 'user', 'username', 'user name', 'handle', 'member', 'nick', 'nickname', 'screen name', 'poster', 'writer', 'autor', 'autorin', 'verfasser', 'benutzer', 'nutzer', 'benutzername', 'mitglied', 'auteur',
    'utilisateur', 'pseudo', 'membre', 'usuario', 'autora', 'miembro', 'utilizador', 'membro', 'autore', 'utente', 'gebruiker',
  ],
  topic: ['topic', 'theme', 'subject', 'category', 'aspect', 'thema', 'kategorie', 'rubrik', 'theme', 'sujet', 'categorie', 'tema', 'asunto', 'categoria', 'assunto', 'topico', 'argomento', 'onderwerp'],
  id: ['id', 'ref', 'reference', 'identifier', 'uid', 'guid', 'uuid', 'key', 'number', 'nr', 'no', 'post id', 'nummer', 'kennung', 'identifiant', 'identificador', 'url', 'link', 'permalink'],
  thread: ['thread', 'conversation', 'discussion', 'thread id', 'conversation id', 'gesprach', 'diskussion', 'faden', 'fil', 'conversacion', 'hilo', 'conversa', 'discussione', 'gesprek'],
  reply_to: ['reply to', 'in reply to', 'parent', 'parent id', 'reply', 'antwort auf', 'antwort', 'reponse a', 'respuesta a', 'resposta a', 'risposta a', 'antwoord op'],
  brand: ['brand', 'about', 'company', 'client', 'marke', 'firma', 'unternehmen', 'marque', 'entreprise', 'marca', 'empresa', 'azienda', 'merk', 'bedrijf'],
  segment: ['segment', 'customer type', 'customer group', 'customer segment', 'audience', 'kundengruppe', 'kundentyp', 'zielgruppe', 'type de client', 'tipo de cliente', 'segmento', 'klantgroep'],
  text: [
    'text', 'body', 'content', 'message', 'comment', 'post', 'full text', 'inhalt', 'nachricht', 'beitrag', 'kommentar', 'texte', 'contenu', 'commentaire', 'texto', 'contenido', 'mensaje', 'comentario', 'conteudo',
    'mensagem', 'testo', 'contenuto', 'tekst', 'bericht', 'snippet',
  ],
}

/** Names of what is none of ours, however its values look. */
const foreign = [
  'language', 'lang', 'country', 'region', 'city', 'gender', 'age', 'followers', 'likes', 'shares', 'views', 'reach', 'sprache', 'land', 'ort', 'langue', 'pays', 'idioma', 'pais', 'lingua', 'paese', 'taal',
]

/** Words for the time at which a row came into a collection, not at which its post was written. */
const later = ['collected', 'crawled', 'fetched', 'imported', 'indexed', 'inserted', 'updated', 'modified', 'edited', 'retrieved', 'exported', 'abgerufen', 'geandert', 'importiert', 'modifie', 'recolte', 'actualizado', 'atualizado', 'coletado']

/** What the name of a column says. */
export interface NameEvidence {
  /** 1 where the name is one of the column's usual ones, 0.6 where a word of it is, 0 otherwise. */
  readonly weight: Readonly<Record<Role, number>>
  readonly foreign: boolean
  /** The time of collecting, not of posting. */
  readonly later: boolean
}

/** A name as it is compared: words in lower case without accents. @example wordsOf('postedAt') // => ['posted', 'at'] */
export function wordsOf(name: string): readonly string[] {
  return name.slice(0, 200).replace(/(\p{Ll})(\p{Lu})/gu, '$1 $2').normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().split(/[^\p{L}]+/u).filter((word) => word !== '')
}

export function nameEvidence(name: string): NameEvidence {
  const words = wordsOf(name)
  const whole = words.join(' ')
  const weigh = (role: Role): number => (names[role].includes(whole) ? 1 : names[role].some((known) => words.includes(known)) ? 0.6 : 0)
  return {
    weight: Object.fromEntries(roles.map((role) => [role, weigh(role)])) as Record<Role, number>,
    foreign: words.some((word) => foreign.includes(word)), later: words.some((word) => later.includes(word)),
  }
}

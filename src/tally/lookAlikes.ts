/**
 * Is it petroleum? A short aid that weighs what was seen. Clues: films of iron or manganese bacteria, rotting plants and
 * algae break into plates that stay apart when poked, petroleum swirls and closes again; natural slicks of the sea come
 * at light winds and none is left above 7 m/s; shadows and calm patches move with cloud or land and show no colour
 * bands. Common practice of several agencies; a screen, not a proof.
 */
export type Answer = 'yes' | 'no' | 'unknown';

export type LookAlikeQuestionId =
  | 'colourBands'
  | 'movesWithCloudOrLand'
  | 'breaksIntoPlates'
  | 'closesAgain'
  | 'plantOrRustNearby'
  | 'pollenOrScum'
  | 'fuelSmellNoticed'
  | 'sourceSeen'
  | 'spreadsUnderStrongWind';

export interface LookAlikeQuestion {
  readonly id: LookAlikeQuestionId;
  readonly text: string;
  readonly help: string;
  /** Likelihood of "yes" and of "no" under petroleum against under something natural, as log ratios; 0 says nothing. */
  readonly ifYes: number;
  readonly ifNo: number;
  /** What the answer means, for the reason. */
  readonly yesMeans: string;
  readonly noMeans: string;
}

/** Asked in this order. Weights are our own judgement of how telling each clue is, not measured frequencies. */
export const LOOK_ALIKE_QUESTIONS: readonly LookAlikeQuestion[] = [
  {
    id: 'movesWithCloudOrLand',
    text: 'Does the patch move with a cloud, or keep to the lee of land, a wall or a ship?',
    help: 'Cloud shadow, wind shadow and calm patches look like slicks from afar.',
    ifYes: -2.5,
    ifNo: 0,
    yesMeans: 'it moves with cloud or keeps to the lee, as shadows and calm patches do',
    noMeans: '',
  },
  {
    id: 'colourBands',
    text: 'Are there bands of colour, or a silver film with a clear edge?',
    help: 'Both oil and films of bacteria can show colour; without any film, think of shadow, calm water, weed or sediment.',
    ifYes: 0.3,
    ifNo: -1,
    yesMeans: 'there is a film with colour or a clear edge',
    noMeans: 'no film colour and no clear edge was seen',
  },
  {
    id: 'breaksIntoPlates',
    text: 'Poked with a stick from a safe place, does it break into plates that stay apart?',
    help: 'Only without contact and from firm ground; otherwise answer “Cannot tell”. Old or waxy oil can break up as well.',
    ifYes: -2.5,
    ifNo: 0.5,
    yesMeans: 'it broke into plates that stayed apart, as films of bacteria and plants do',
    noMeans: 'it did not break into plates',
  },
  {
    id: 'closesAgain',
    text: 'Does it swirl and close again behind the stick?',
    help: 'Petroleum runs together again within seconds.',
    ifYes: 2.5,
    ifNo: -0.5,
    yesMeans: 'it swirled and closed again, as petroleum does',
    noMeans: 'it did not close again',
  },
  {
    id: 'plantOrRustNearby',
    text: 'Is it still, shallow water with orange fluff, slime or rotting plants beside it?',
    help: 'There, bacteria that live on iron or manganese make a film like oil.',
    ifYes: -1.2,
    ifNo: 0.2,
    yesMeans: 'orange fluff, slime or rotting plants lie beside it',
    noMeans: '',
  },
  {
    id: 'pollenOrScum',
    text: 'Is it yellow dust, a green or red bloom, or foam rather than a film?',
    help: 'Pollen, algae, sawdust, sewage fat and detergent foam.',
    ifYes: -2,
    ifNo: 0,
    yesMeans: 'it is dust, bloom or foam rather than a film',
    noMeans: '',
  },
  {
    id: 'fuelSmellNoticed',
    text: 'Did you notice a smell of fuel from where you stand?',
    help: 'Never sniff on purpose. If you smell it, go upwind and away first.',
    ifYes: 2.5,
    ifNo: 0,
    yesMeans: 'a smell of fuel was noticed',
    noMeans: '',
  },
  {
    id: 'sourceSeen',
    text: 'Does it lead to a ship, a pipe, a drain, a yard or a wreck?',
    help: 'Clean water ahead of a ship and film behind it counts.',
    ifYes: 1.5,
    ifNo: 0,
    yesMeans: 'it leads to a possible source',
    noMeans: '',
  },
  {
    id: 'spreadsUnderStrongWind',
    text: 'On open water, does the slick hold together in a wind above 7 m/s (Beaufort 4 or more)?',
    help: 'Natural slicks are common at 2 to 4 m/s and gone above 7.',
    ifYes: 1.5,
    ifNo: 0,
    yesMeans: 'it holds together in a wind that breaks natural slicks',
    noMeans: '',
  },
];

export type LookAlikeConclusion = 'petroleumLikely' | 'biogenicLikely' | 'cannotSay';

export interface LookAlikeResult {
  readonly conclusion: LookAlikeConclusion;
  /** One sentence for the record. */
  readonly reason: string;
  /** Answers that had a say, most telling first. */
  readonly because: readonly LookAlikeQuestionId[];
}

/** Evidence needed before anything is called likely: about 6 to 1. */
const LIKELY = 1.8;
/** Clues as strong as this on both sides contradict each other, whatever their sum. */
const STRONG = 2.5;

/** Weighs the answers; questions not answered count as unknown. In doubt the result says so, and to report all the same. */
export function weighLookAlikes(
  answers: Readonly<Partial<Record<LookAlikeQuestionId, Answer>>>,
): LookAlikeResult {
  const clues = LOOK_ALIKE_QUESTIONS.flatMap((question) => {
    const answer = answers[question.id] ?? 'unknown';
    const weight = answer === 'yes' ? question.ifYes : answer === 'no' ? question.ifNo : 0;
    const means = answer === 'yes' ? question.yesMeans : question.noMeans;
    return weight === 0 ? [] : [{ id: question.id, weight, means }];
  }).sort((a, b) => Math.abs(b.weight) - Math.abs(a.weight));
  const sum = clues.reduce((total, { weight }) => total + weight, 0);
  const because = clues.map(({ id }) => id);
  const contradict =
    clues.some(({ weight }) => weight >= STRONG) && clues.some(({ weight }) => weight <= -STRONG);
  if (contradict || Math.abs(sum) < LIKELY) {
    return {
      conclusion: 'cannotSay',
      reason: contradict
        ? 'Cannot say: strong signs of petroleum and of something else were both seen. Report it all the same.'
        : 'Cannot say: what was seen fits petroleum and other films alike. Report it all the same.',
      because,
    };
  }
  const side = Math.sign(sum);
  const reasons = clues
    .filter(({ weight, means }) => Math.sign(weight) === side && means)
    .map(({ means }) => means);
  const conclusion = side > 0 ? 'petroleumLikely' : 'biogenicLikely';
  const words = side > 0 ? 'Petroleum likely' : 'Biogenic or another look-alike likely';
  const end = side > 0 ? '' : ' A sample settles it; report it if in doubt.';
  return { conclusion, reason: `${words}: ${reasons.slice(0, 3).join('; ')}.${end}`, because };
}

/** Region of a preset and the pair of tissues whose contrast is shown. */
interface Region {
  readonly region: string;
  readonly pair: readonly [string, string];
}

const brain: Region = { region: 'brain', pair: ['white matter', 'grey matter (cortical)'] };
const cord: Region = { region: 'spine', pair: ['CSF', 'skeletal muscle'] };
const liver: Region = { region: 'liver', pair: ['liver', 'spleen'] };
const joint = (region: string): Region => ({ region, pair: ['synovial fluid', 'articular cartilage'] });

/** Body parts as DICOM codes them (PS3.16, annex L); the pairs are assumed, common practice. */
const regions: Readonly<Record<string, Region>> = {
  BRAIN: brain,
  HEAD: brain,
  SKULL: brain,
  NECK: { ...cord, region: 'cervical spine' },
  CSPINE: { ...cord, region: 'cervical spine' },
  TSPINE: cord,
  SPINE: cord,
  LSPINE: { ...cord, region: 'lumbar spine' },
  ABDOMEN: liver,
  LIVER: liver,
  BREAST: { region: 'breast', pair: ['breast fibroglandular', 'subcutaneous fat'] },
  HEART: { region: 'heart', pair: ['blood (arterial, oxygenated)', 'myocardium'] },
  KNEE: joint('knee'),
  SHOULDER: joint('shoulder'),
  PELVIS: { region: 'pelvis', pair: ['myometrium', 'skeletal muscle'] },
  UTERUS: { region: 'pelvis', pair: ['myometrium', 'skeletal muscle'] },
  PROSTATE: { region: 'prostate', pair: ['prostate', 'skeletal muscle'] },
};

/** Two tissues that every region has. */
const unknown: Region = { region: 'not stated', pair: ['skeletal muscle', 'subcutaneous fat'] };

/**
 * The region of a draft by the first body part that is stated; the pair of tissues is always assumed.
 *
 * @example regionOf([null, 'KNEE']).region //=> 'knee'
 */
export function regionOf(bodyParts: readonly (string | null)[]): Region & { readonly isAssumed: boolean } {
  const stated = bodyParts.find((part) => part !== null && Object.hasOwn(regions, part));
  return stated == null ? { ...unknown, isAssumed: true } : { ...(regions[stated] as Region), isAssumed: false };
}

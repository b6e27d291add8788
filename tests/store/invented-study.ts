/** An invented preset of one series, as the text of its file. */
export function inventedPreset(id: string, revision = 1): string {
  return JSON.stringify({
    format: 'holdfast preset',
    version: 1,
    id,
    title: 'Invented',
    region: 'brain',
    fieldT: 1.5,
    revision,
    series: [
      {
        id: 't2',
        title: 'T2',
        family: 'fast-spin-echo',
        acquisition: '2D',
        target: 'white matter',
        comparison: 'grey matter (cortical)',
        parameters: {
          repetitionTimeMs: 4000,
          echoTimeMs: 100,
          echoTrainLength: 16,
          fieldOfViewMm: 230,
          matrixRead: 320,
          matrixPhase: 256,
          sliceCount: 24,
          sliceThicknessMm: 5,
          pixelBandwidthHz: 200,
        },
      },
    ],
  });
}

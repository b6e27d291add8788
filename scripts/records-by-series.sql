-- What `holdfast records report` counts, asked of the record files themselves with DuckDB: one row a preset and series.
-- The files are plain JSON lines; $files is a path, or a list of paths read as one. What is cut short is left out, as the report does;
-- sums of lines are not checked here, so check a doubtful file with `holdfast records report` first.
with line as (
  select preset, series, reasons
  from read_json($files, format = 'newline_delimited', ignore_errors = true, maximum_object_size = 16777216,
    columns = { preset: 'JSON', series: 'JSON[]', reasons: 'VARCHAR[]', sum: 'VARCHAR' })
  where sum is not null
),
one as (
  select
    preset ->> '$.id' as preset,
    item ->> '$.id' as series,
    item ->> '$.outcome' as outcome,
    coalesce(nullif(trim(item ->> '$.reason'), ''), list_filter(reasons, reason -> trim(reason) <> '')[1]) is not null as has_reason,
    (item -> '$.planned.parameters') <> (item -> '$.used.parameters') as rewritten,
    item ->> '$.quality' as quality,
    json_array_length(item -> '$.crossed') as crossed,
    cast(item ->> '$.used.parameters.sliceThicknessMm' as double)
      - cast(item ->> '$.planned.parameters.sliceThicknessMm' as double) as thicker_mm,
    cast(item ->> '$.readings.after.timeS' as double) / cast(item ->> '$.used.figures.scanTimeS' as double) - 1 as time_error
  from (select preset, reasons, unnest(series) as item from line)
)
select
  preset,
  series,
  count(*) as recorded,
  count(*) filter (outcome <> 'given-up') as run,
  count(*) filter (outcome = 'repeated') as repeated,
  count(*) filter (outcome = 'given-up') as given_up,
  count(*) filter (rewritten) as rewritten,
  count(*) filter (rewritten and quality = 'diagnostic') as rewritten_diagnostic,
  count(*) filter ((rewritten or outcome <> 'done') and not has_reason) as without_reason,
  coalesce(sum(crossed), 0) as crossed,
  count(*) filter (thicker_mm > 0) as thicker,
  quantile_cont(thicker_mm, 0.5) filter (thicker_mm <> 0) as thicker_median_mm,
  quantile_cont(thicker_mm, 0.75) filter (thicker_mm <> 0) as thicker_high_quartile_mm,
  count(time_error) as times_read
from one
group by preset, series
order by preset, series;

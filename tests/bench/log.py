"""The sums of `bench/log.rs` by a data-frame library: read, classify, convert, group, sum. Times cover all of that, not
the start of Python. Rows that are equal are counted too, as our reader does."""

import json
import sys
import time

import polars as pl

path = sys.argv[1]
density = {name: float(value) for name, value in (pair.rsplit("=", 1) for pair in sys.argv[2:])}
cpu, wall = time.process_time(), time.perf_counter()
table = pl.read_csv(path, infer_schema=False)
repeated = table.height - table.n_unique()
sums = {}
if "Batch" in table.columns:
    kind = pl.col("QC type").str.to_lowercase()
    rows = table.with_columns(
        pl.col("Prep date").str.to_date("%Y-%m-%d").dt.strftime("%Y-%m").alias("month"),
        kind.is_in(["mb", "lcs", "blank", "control"]).alias("control"),
        (pl.col("Re-extract").fill_null("").str.to_lowercase() == "yes").alias("repeat"),
    )
    found = rows.group_by("month", "Method").agg(
        pl.len().alias("extractions"), pl.col("control").sum(), pl.col("repeat").sum(), pl.col("Batch").n_unique()
    )
    for row in found.iter_rows(named=True):
        for what, column in (("extractions", "extractions"), ("controls", "control"), ("repeats", "repeat")):
            sums[f"{row['month']} {row['Method']} {what}"] = row[column]
else:
    factor = pl.col("Unit").replace_strict({"L": 1e-3, "g": 1e-3}, return_dtype=pl.Float64)
    mass = pl.when(pl.col("Unit") == "L").then(pl.col("Item").replace_strict(density, return_dtype=pl.Float64)).otherwise(1.0)
    rows = table.with_columns(
        pl.col("Order date").str.to_date("%Y-%m-%d").dt.strftime("%Y-%m").alias("month"),
        (pl.col("Amount").cast(pl.Float64) * factor * mass).alias("kg"),
    )
    for row in rows.group_by("month", "Item").agg(pl.col("kg").sum()).iter_rows(named=True):
        sums[f"{row['month']} {row['Item']}"] = row["kg"]
print(json.dumps({
    "cpu_seconds": time.process_time() - cpu,
    "wall_seconds": time.perf_counter() - wall,
    "repeated": repeated,
    "sums": sums,
}))

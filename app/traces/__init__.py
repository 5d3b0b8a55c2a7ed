"""The traces: stacked charts under the bench, over the same x axis."""

"""The ledger: a catalogue of links that keeps the evidence for every decision."""

"""Files to model: strict YAML with lines, schemas, quantities, references, rule sets."""

"""Reports: an Appraisal drawn as text, workbook or JSON. No database; nothing is computed a second time."""

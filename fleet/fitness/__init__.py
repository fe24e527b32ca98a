"""Metal-loss assessments of scans. Pure. No method is in this release."""

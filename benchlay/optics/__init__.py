"""Light as numbers: rays, faces, materials, polarization, envelopes and their cuts."""

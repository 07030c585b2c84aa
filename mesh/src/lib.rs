//! Graded node lines, tensor (r, z) grids, measures, regions and quality figures. Knows no physics.

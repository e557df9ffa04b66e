"""What a person writes: rig file, limit set, stick file and record, read strictly and with every mistake named.

Modules: `reading` (files to models), `rig`, `canopy`, `parts` (the rig file), `limits`, `stick`, `record`, `digest`,
`canopy_table`, `errors`. Nothing is imported here, so that a caller pays only for what it reads.
"""

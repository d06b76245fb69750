"""Fixed wording of figures and report: verdicts, populations, method, cautions, deference."""

POPULATIONS = {"general_public": "general public", "occupational": "occupational"}
EFFECTS = {"heating": "heating", "stimulation": "nerve stimulation"}
SCOPES = {"whole_body": "whole body", "local": "local", "any": "any part"}
ALL = "all"

VERDICTS = {
    "within limits": (
        "For the places and transmissions of the site file every test of the chosen limits is met."
    ),
    "exceeds limits": (
        "At least one place is exposed beyond a limit. Do not transmit as described while people can be "
        "there; change the station or the site file, and assess again."
    ),
    "cannot be decided": (
        "At least one thing that the verdict needs is unknown, unfinished or unchecked. Treat the station "
        "as exceeding the limits until it is settled."
    ),
}

EXPOSURE_RATIO = (
    "The exposure ratio compares squared field strengths (or power densities) with the limit: it is "
    "proportional to power and 1 at the limit; half the field strength is a quarter of it. Shares of the "
    "limit in this report are exposure ratios in percent."
)

AREA_COLUMNS = (
    "Exposure ratio: at the worst place of the area. Upper bound: with numerical error added. Body "
    "average: over a standing body, where the document allows it. E and H: rms, of the transmission named, "
    "at its mean power for the test that governs, at the place named."
)

DISTANCES = (
    "Each transmission alone. Compliance distance: from the nearest conductor of the antenna to the "
    "farthest place where the limit is reached, in any direction and at any height. Setback: the same in "
    "plan, at 0-2 m above ground; 0 means that the limit is not reached there. Several transmissions "
    "together can reach farther: the figures show the zone of all."
)

LEVELS = (
    "Field strengths are rms. Power densities are those of an equivalent plane wave. 'Not verified in "
    "print' marks a level that nobody has compared with the document: nothing is within limits that rests "
    "on it."
)

METHOD = (
    "Antennas, modelled feed lines and other metal named in the site file are solved together as thin "
    "wires by the method of moments: a mixed-potential integral equation with piecewise-linear currents "
    "and Galerkin testing. Conductor losses follow from skin effect.",
    "The ground is flat and uniform. Real ground is a lossy half space, by Sommerfeld integrals tabulated "
    "for each frequency; it is not a reflection factor, so none is applied on top.",
    "Electric and magnetic fields are computed apart, near field included, as rms values of the "
    "undisturbed field. Below 30 MHz, and wherever people are near an antenna, each can reach its limit "
    "without the other.",
    "The greatest exposure ratio of an area is searched for over the whole volume of the area, not at a "
    "few points. The boundary is where the exposure ratio is 1.",
)

METHOD_LIMITS = (
    "Uneven or layered ground, buildings, wiring in walls, vehicles, trees and people are not in the model "
    "unless the site file draws them as conductors. House wiring and gutters near an antenna can raise the "
    "field manyfold.",
    "The doubt that is added to a result is numerical only: the change of the fields on another mesh and "
    "the balance of powers. Doubt about powers, dimensions, soil and positions is the operator's to cover "
    "by safe inputs.",
)

QUALITY = (
    "unknowns: number of currents on the wires that were solved for.",
    "power balance: radiated, ground, conductor and load power against accepted power; 0 is perfect, 1 % "
    "is allowed.",
    "mesh change: change of the field on another mesh at the places that decide; 0 is perfect, 1 % is "
    "allowed.",
    "boundary residual: what is left of the tangential field on the wires between the points of the "
    "method; for information only.",
)

CAUTIONS = (
    "This report is a calculation. It is no permission to operate, and no proof that a station as built is "
    "the station as described.",
    "Never touch or work near an antenna, its feed line or metal beside it while it can transmit. High "
    "voltage and RF burns threaten at field levels far below the limits used here; near power lines and at "
    "height there is danger of life. Switch off and lock the transmitter first.",
    "People with medical implants or devices worn on the body (pacemakers, defibrillators, insulin pumps, "
    "hearing implants) may be disturbed below these limits. Let them keep farther away and ask their "
    "physician.",
)

DEFERENCE = (
    "Local rules come first: the law and the authority's current text decide which limits, methods, "
    "filings and records apply. Check the editions named here against what is in force.",
    "Where a rule or code asks for a licensed or qualified person (a professional engineer, an "
    "electrician, an RF safety officer), for a measurement, or for another authority's approval (building, "
    "electrical, lightning protection, work at height), this report replaces none of them.",
    "Where a measurement by a competent person shows more than this report, the measurement counts.",
)

ACCESS = (
    "Keep people out of every zone drawn in the figures while transmitting: by height, fence, locked door "
    "or by somebody who watches and can stop the transmission. A zone at head height beside a path is not "
    "controlled.",
    "Keep all parts that carry voltage out of reach, with children, ladders, balconies and open windows in "
    "mind. As a rule of thumb at least 2.5 m above places where people stand.",
    "Tell household members, visitors and trades (roofers, painters, chimney sweeps, window cleaners) "
    "where the zone is, who switches off, and how. Put that on a sign at the door, ladder or hatch that "
    "leads there.",
    "Where occupational levels are used, keep the record of who was informed and when with this report.",
)

ASSESS_AGAIN = (
    "Assess again after any change of power, transmitter, mode or duty, band, antenna, height, position or "
    "feed line; of buildings, windows, balconies, paths or metal nearby; of other transmitters at the "
    "site; or of the rules. Once a year check that the site file is still true."
)

VALIDITY = (
    "This report holds for the station, the places and the limits described in the site file printed here, "
    "and for nothing else."
)

STATEMENT = (
    "I have compared this report with the station as built. The site file describes it, and the conditions "
    "stated with the verdict are kept."
)

ATTACHED = (
    "The result (assessment.json) and the site file are attached to this PDF. The report can be made again "
    "from the result alone with: exposure report assessment.json"
)

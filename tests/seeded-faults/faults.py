"""Faults of the kind that pass a bridge that should not pass. Each is one exact replacement in one source file; `filter` names the tests that must
see it, where they are not the hand-worked and demo ones."""

FAULTS = [
    {
        "name": "dead-load factors swapped",
        "why": "rule B5: a load that acts takes the adverse factor, one that relieves the relieving factor",
        "file": "src/PermitScreen.Rating/Ladder/DeadLoads.cs",
        "find": "inSense > 0 ? factor.Adverse : factor.Relieving",
        "put": "inSense > 0 ? factor.Relieving : factor.Adverse",
    },
    {
        "name": "allowance on the lane load",
        "why": "rule B4: IM never on uniform lane loads",
        "file": "src/PermitScreen.Rating/Ladder/ArrangedLoad.cs",
        "find": "LaneKn = _laneKnPerM * _laneArea;",
        "put": "LaneKn = _laneKnPerM * _laneArea * (1 + _permitAllowance);",
    },
    {
        "name": "share divided by 1.20",
        "why": "rule B3: a share by statics holds no multiple presence",
        "file": "src/PermitScreen.Rating/Ladder/VehicleOnPlane.cs",
        "find": "var share = Shares.Of(unit, effect.PlaneId, centreM);",
        "put": "var share = Shares.Of(unit, effect.PlaneId, centreM) / 1.2;",
    },
    {
        "name": "eccentricity by overall width",
        "why": "rules A2, C1: the width over tyres limits how far the vehicle stands aside",
        "file": "src/PermitScreen.Service/Mapping/ApplicationMapper.cs",
        "find": "gaps.Count == 0 ? vehicle : null",
        "put": "gaps.Count == 0 ? (width is { } w && vehicle is { } v ? v with { WidthOverTyresM = w } : vehicle) : null",
    },
    {
        "name": "one plane only",
        "why": "rule C2: both planes are rated",
        "file": "src/PermitScreen.Rating/Ladder/LadderScreening.cs",
        "find": "foreach (var effect in unit.Effects)",
        "put": "foreach (var effect in unit.Effects.Where(e => e.PlaneId == unit.LeftPlane.PlaneId))",
    },
    {
        "name": "one direction only",
        "why": "design, section 4: both directions unless the crossing fixes one",
        "file": "src/PermitScreen.Rating/Ladder/LadderScreening.cs",
        "find": "configurationId, vehicle, directions, arrangements, factors)",
        "put": "configurationId, vehicle, directions == TravelDirections.Both ? TravelDirections.Forward : directions, arrangements, factors)",
    },
    {
        "name": "other lane dropped",
        "why": "rule A4: the other lanes' vehicles count",
        "file": "src/PermitScreen.Rating/Ladder/ArrangedLoad.cs",
        "find": "OthersKn = othersSum;",
        "put": "OthersKn = 0 * othersSum;",
    },
    {
        "name": "rung ignored",
        "why": "rule B1: place and allowance are the rung's own",
        "file": "src/PermitScreen.Rating/Ladder/LadderScreening.cs",
        "find": "new RungScreening(structure, permitKind, directions, policy, rung, extremes)",
        "put": "new RungScreening(structure, permitKind, directions, policy, rung with { LateralPlace = policy.Rungs[0].LateralPlace, Allowance = policy.Rungs[0].Allowance }, extremes)",
    },
    {
        "name": "not assessed taken as a pass",
        "why": "rule F4: absent is never zero",
        "file": "src/PermitScreen.Rating/Ladder/LadderScreening.cs",
        "find": "_missing.Count > 0 ? RungOutcome.NotAssessed",
        "put": "_missing.Count > 0 ? RungOutcome.Passes",
    },
    {
        "name": "snapshot taken before the version is read",
        "why": "design, section 6: a current answer rests on a version not older than the newest committed before the call",
        "file": "src/PermitScreen.Catalogue/Snapshots/CurrentCatalogue.cs",
        "find": "var snapshot = await ReachAsync(await _confirmation.ConfirmAsync(cancellation), cancellation);",
        "put": "var snapshot = _newest ?? await ReachAsync(await _confirmation.ConfirmAsync(cancellation), cancellation); await _confirmation.ConfirmAsync(cancellation);",
        "filter": "FullyQualifiedName~.Currency.",
    },
]

/**
 * The named constituents that stand on a line of the potential, and their aliases. Speeds are derived, never typed.
 *
 * Multipliers after A. T. Doodson (1921) and P. Schureman (1940), table 2; quarter turns by the sign of the line in
 * Cartwright and Edden (1973), which a test compares; those of Mf and Mm are left out, as the trade does.
 * @module
 */

/**
 * Rows `name letters`: XDO letters for τ, s, h, p, N′, p_s and the quarter turns; `*` marks the meteorological ones
 * (f = 1, u = 0 in every model).
 */
export const NAMED: string =
  'Sa*ZZAZZZZ Ssa*ZZBZZZZ MSm ZAXAZZZ Mm ZAZYZZZ MSf ZBXZZZZ Mf ZBZZZZZ Mtm ZCZYZZZ MSqm ZDXZZZZ ' +
  '2Q1 AWZBZZY SIG1 AWBZZZY Q1 AXZAZZY RHO1 AXBYZZY O1 AYZZZZY TAU1 AYBZZZA BET1 AZXAZZA M1 AZZAZZA CHI1 AZBYZZA ' +
  'PI1 AAWZZAY P1 AAXZZZY S1*AAYZZZB K1 AAZZZZA PSI1 AAAZZYA PHI1 AABZZZA THE1 ABXAZZA J1 ABZYZZA OO1 ACZZZZA ' +
  'UPS1 ADZYZZA ' +
  'EPS2 BWBAZZZ 2N2 BXZBZZZ MU2 BXBZZZZ N2 BYZAZZZ NU2 BYBYZZZ GAM2 BZXBZZB H1 BZYZZAB M2 BZZZZZZ H2 BZAZZYZ ' +
  'LAM2 BAXAZZB L2 BAZYZZB T2 BBWZZAZ S2 BBXZZZZ R2 BBYZZYB K2 BBZZZZZ ETA2 BCZYZZZ M3 CZZZZZB';

/** Rows `alias=name`. */
export const ALIASES: string =
  'SA=Sa SSA=Ssa MSM=MSm MM=Mm MSF=MSf MF=Mf MTM=Mtm MSQM=MSqm σ1=SIG1 SIGMA1=SIG1 RHO=RHO1 ρ1=RHO1 τ1=TAU1 ' +
  'β1=BET1 χ1=CHI1 π1=PI1 ψ1=PSI1 φ1=PHI1 ϕ1=PHI1 θ1=THE1 ϑ1=THE1 THETA1=THE1 υ1=UPS1 ε2=EPS2 μ2=MU2 ν2=NU2 γ2=GAM2 ' +
  'λ2=LAM2 LAMBDA2=LAM2 LDA2=LAM2 η2=ETA2';

/** The compounds that official tables list, for `listConstituents`; any other is read by the grammar. */
export const LISTED_COMPOUNDS: string =
  'MP1 SO1 2PO1 OP2 2MN2 2SM2 MSN2 MNS2 MKS2 2NS2 SKM2 2MS2 MO3 SO3 MK3 2MK3 SK3 NO3 MN4 M4 SN4 MS4 MK4 S4 SK4 3MS4 ' +
  'ML4 N4 SL4 MNO5 2MO5 2MK5 MSK5 2MP5 2MN6 M6 MSN6 2MS6 2MK6 2SM6 MSK6 S6 2MNO7 2MSO7 3MN8 M8 2MSN8 3MS8 2(MS)8 M10 4MS10 M12';

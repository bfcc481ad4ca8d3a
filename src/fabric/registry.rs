//! The list of statistics, from which column descriptions and help come.

/// One statistic as users meet it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Statistic {
    /// Field name in layers.
    pub name: &'static str,
    /// Short title.
    pub title: &'static str,
    /// Unit; empty for pure numbers and words.
    pub unit: &'static str,
    /// Fewest readings that give a value.
    pub least_n: u32,
    /// Where the definition was published.
    pub source: &'static str,
    /// What it says and when it is missing.
    pub description: &'static str,
}

macro_rules! statistics {
    ($($name:literal, $title:literal, $unit:literal, $least:literal, $source:literal, $description:literal;)*) => {
        /// Every statistic of a fabric.
        pub const ALL: &[Statistic] = &[$(Statistic {
            name: $name, title: $title, unit: $unit, least_n: $least, source: $source, description: $description,
        }),*];
    };
}

statistics! {
    "n", "Readings", "", 0, "count", "Readings in the sample.";
    "n_stations", "Stations", "", 0, "count", "Different stations they come from: the units of tests and cones.";
    "weight_sum", "Sum of weights", "", 0, "sum", "Sum of the readings' weights.";
    "n_effective", "Effective readings", "", 0, "Kish 1965 (from memory)",
        "(sum w)^2 / sum w^2: how many equally weighted readings say as much.";
    "n_clipped", "Clipped weights", "", 0, "Terzaghi 1965; Priest 1993 (from memory)",
        "Readings whose weight against survey bias was cut off at the greatest allowed.";
    "mean_strike", "Mean strike", "degrees", 5, "Scheidegger 1965; Watson 1966",
        "Right-hand strike of the plane whose pole is e1. Missing unless the shape is cluster or transitional.";
    "mean_dip", "Mean dip", "degrees", 5, "Scheidegger 1965; Watson 1966", "Dip of the mean plane.";
    "mean_dip_direction", "Mean dip direction", "degrees", 5, "Scheidegger 1965; Watson 1966",
        "Dip direction of the mean plane.";
    "mean_trend", "Trend of the mean axis", "degrees", 5, "Scheidegger 1965; Watson 1966",
        "Trend of e1, the mean line or mean pole. Missing unless the shape is cluster or transitional.";
    "mean_plunge", "Plunge of the mean axis", "degrees", 5, "Scheidegger 1965; Watson 1966", "Plunge of e1.";
    "s1", "Greatest eigenvalue", "", 1, "Scheidegger 1965; Watson 1966",
        "Greatest eigenvalue of the orientation tensor, trace 1.";
    "s2", "Middle eigenvalue", "", 1, "Scheidegger 1965; Watson 1966", "Middle eigenvalue of the orientation tensor.";
    "s3", "Least eigenvalue", "", 1, "Scheidegger 1965; Watson 1966", "Least eigenvalue of the orientation tensor.";
    "v1_trend", "Trend of e1", "degrees", 1, "Scheidegger 1965; Watson 1966",
        "Trend of the axis of the greatest eigenvalue (arbitrary where S1 = S2).";
    "v1_plunge", "Plunge of e1", "degrees", 1, "Scheidegger 1965; Watson 1966", "Plunge of the same axis.";
    "v2_trend", "Trend of e2", "degrees", 1, "Scheidegger 1965; Watson 1966", "Trend of the axis of the middle eigenvalue.";
    "v2_plunge", "Plunge of e2", "degrees", 1, "Scheidegger 1965; Watson 1966", "Plunge of the same axis.";
    "v3_trend", "Trend of e3", "degrees", 1, "Scheidegger 1965; Watson 1966",
        "Trend of the axis of the least eigenvalue: the normal of a girdle (arbitrary where S2 = S3).";
    "v3_plunge", "Plunge of e3", "degrees", 1, "Scheidegger 1965; Watson 1966", "Plunge of the same axis.";
    "woodcock_k", "Woodcock K", "", 2, "Woodcock 1977",
        "ln(S1/S2)/ln(S2/S3): above 1 on the cluster side, below 1 on the girdle side. Missing where infinite or undefined.";
    "woodcock_c", "Woodcock C", "", 3, "Woodcock 1977",
        "ln(S1/S3), the strength of the fabric. Missing where axes lie in one plane (infinite).";
    "vollmer_p", "Vollmer P", "", 1, "Vollmer 1990", "S1-S2, the point index; P + G + R = 1.";
    "vollmer_g", "Vollmer G", "", 1, "Vollmer 1990", "2(S2-S3), the girdle index. P + G is high for small random samples.";
    "vollmer_r", "Vollmer R", "", 1, "Vollmer 1990", "3 S3, the random index.";
    "resultant", "Resultant length", "readings", 5, "Fisher 1953",
        "Length of the sum of the axes turned to e1's side, from 0 to n. Only for clusters.";
    "fisher_kappa", "Fisher kappa", "", 5, "Fisher 1953",
        "(n-1)/(n-R) of the same: the estimator whose inverse is unbiased. Only for clusters.";
    "fisher_alpha95", "Fisher alpha95", "degrees", 5, "Fisher 1953",
        "Radius of the exact confidence cone of the mean of the stations' directions: uncertainty of the mean, not spread. Only for clusters.";
    "kent_kappa", "Kent kappa", "", 5, "Kent 1982", "Concentration of the directed data, by maximum likelihood. Only for structures with a sense.";
    "kent_beta", "Kent beta", "", 5, "Kent 1982", "Ovalness of the same; above kappa/2 there are two modes. Only for structures with a sense.";
    "watson_kappa", "Watson kappa", "", 5, "Watson 1965; Mardia & Jupp 2000 (from memory)",
        "Maximum likelihood: positive where axes crowd about e1, negative where they avoid e3; the likelier of the two.";
    "bingham_k2", "Bingham k2", "", 5, "Bingham 1974",
        "Maximum likelihood along e2, with k1 = 0 along e1. Missing where axes lie in one plane (infinite).";
    "bingham_k3", "Bingham k3", "", 5, "Bingham 1974", "Maximum likelihood along e3, k1 = 0 >= k2 >= k3.";
    "mean_cone_major", "Cone of e1, greater semi-axis", "degrees", 5,
        "Fisher, Lewis & Embleton 1987; Prentice 1984 (from memory), with Hotelling's factor",
        "Greater semi-axis of the elliptical confidence cone of e1, stations as units. Missing where it passes 45 degrees: undetermined.";
    "mean_cone_minor", "Cone of e1, lesser semi-axis", "degrees", 5,
        "Fisher, Lewis & Embleton 1987; Prentice 1984 (from memory), with Hotelling's factor", "Lesser semi-axis of the same cone.";
    "axis_cone_major", "Cone of the fold axis, greater semi-axis", "degrees", 5,
        "Fisher, Lewis & Embleton 1987; Prentice 1984 (from memory), with Hotelling's factor",
        "Greater semi-axis of the elliptical confidence cone of e3, the fold axis.";
    "axis_cone_minor", "Cone of the fold axis, lesser semi-axis", "degrees", 5,
        "Fisher, Lewis & Embleton 1987; Prentice 1984 (from memory), with Hotelling's factor", "Lesser semi-axis of the same cone.";
    "cylindricity", "Cylindricity", "", 1, "Vollmer 1990",
        "1 - 3 S3. High by chance in small samples: random axes average 0.675 with 5 readings, 0.487 with 10, 0.159 with 100.";
    "rms_misfit", "Misfit of the girdle", "degrees", 1, "least squares",
        "Root mean square angle of the poles from the great circle normal to the fold axis.";
    "cone_half_angle", "Cone half-angle", "degrees", 10,
        "Cruden & Charlesworth 1972; Gray, Geiser & Geiser 1980 (from memory)",
        "Half-angle of the small circle on which the poles lie, where it fits better than a great circle (F test, 5 %) on an arc of 120 degrees or more.";
    "interlimb", "Interlimb angle", "degrees", 20, "geometry",
        "Angle between the mean planes of two limbs, where two sets lie on the girdle; readings in the hinge tell it from its supplement.";
    "share", "Share of a set", "", 20, "Sra & Karp 2013; Peel, Whiten & McLachlan 2001 (from memory)",
        "Share of all weight that belongs to the set.";
    "uniformity_p", "Uniformity p", "", 5, "Bingham 1974; Jupp 2001 (from memory)",
        "p-value of Bingham's test of no preferred orientation, corrected for small samples, stations as units. Blind to three orthogonal sets.";
    "shape", "Shape", "", 0, "own rules, documented",
        "cluster, girdle, transitional, multimodal, random or too_few.";
    "note", "Note", "", 0, "none", "Why a value is missing or weak.";
}

#[cfg(test)]
mod tests {
    use super::ALL;

    #[test]
    fn every_statistic_is_named_once_and_described() {
        for (i, s) in ALL.iter().enumerate() {
            assert!(!s.title.is_empty() && !s.source.is_empty() && s.description.ends_with('.'), "{}", s.name);
            assert!(ALL[..i].iter().all(|other| other.name != s.name), "{} twice", s.name);
        }
    }
}

//! Every entity that is written, one line each: the method's parameters, then the record or records (a complex
//! instance) with the attributes in the schema's order. Attributes that are always the same stand in the record.

use std::io::Write;

use super::error::Error;
use super::part21::{Derived, Enumeration, Exchange, Id, Parameter, Typed};

/// A length, area, volume, angle, count or ratio with the name of its type.
pub(super) type Measure = Typed<f64>;

/// One end of a trimmed curve: its point and its parameter on the basis curve.
pub(super) type Trim = (Id, Measure);

/// Knots of a B-spline: the multiplicities, then the distinct values.
pub(super) type Knots<'a> = (&'a [usize], &'a [f64]);

const METRE: Enumeration = Enumeration("METRE");
const UNSPECIFIED: Enumeration = Enumeration("UNSPECIFIED");

macro_rules! entities {
    ($($method:ident($($name:ident: $kind:ty),*) = $($keyword:ident($($value:expr),*))+;)*) => {
        impl<W: Write> Exchange<W> {
            $(pub(super) fn $method(&mut self, $($name: $kind),*) -> Result<Id, Error> {
                self.instance(&mut [$((stringify!($keyword), &[$(&$value as &dyn Parameter),*])),+])
            })*
        }

        /// The keywords of each entity that can be written: one, or several of a complex instance.
        #[cfg(test)]
        pub(super) const ENTITIES: &[&[&str]] = &[$(&[$(stringify!($keyword)),+]),*];
    };
}

entities! {
    // what the file is about
    application_context(application: &str) = APPLICATION_CONTEXT(application);
    application_protocol(schema: &str, year: usize, context: Id) = APPLICATION_PROTOCOL_DEFINITION("international standard", schema, year, context);
    product_context(context: Id) = PRODUCT_CONTEXT("", context, "mechanical");
    definition_context(context: Id) = PRODUCT_DEFINITION_CONTEXT("part definition", context, "design");
    product(id: &str, name: &str, description: &str, context: Id) = PRODUCT(id, name, description, [context]);
    category(product: Id) = PRODUCT_RELATED_PRODUCT_CATEGORY("part", "", [product]);
    formation(product: Id) = PRODUCT_DEFINITION_FORMATION("1", "", product);
    definition(formation: Id, context: Id) = PRODUCT_DEFINITION("design", "", formation, context);
    definition_shape(definition: Id) = PRODUCT_DEFINITION_SHAPE("", "", definition);
    shape_of(shape: Id, representation: Id) = SHAPE_DEFINITION_REPRESENTATION(shape, representation);

    // assemblies
    occurrence(id: &str, name: &str, whole: Id, part: Id) = NEXT_ASSEMBLY_USAGE_OCCURRENCE(id, name, "", whole, part, None::<&str>);
    transformation(from: Id, to: Id) = ITEM_DEFINED_TRANSFORMATION("", "", from, to);
    placed(part: Id, whole: Id, by: Id) = REPRESENTATION_RELATIONSHIP("", "", part, whole) REPRESENTATION_RELATIONSHIP_WITH_TRANSFORMATION(by) SHAPE_REPRESENTATION_RELATIONSHIP();
    placed_shape(relation: Id, shape: Id) = CONTEXT_DEPENDENT_SHAPE_REPRESENTATION(relation, shape);

    // units
    metre(prefix: Option<Enumeration>) = LENGTH_UNIT() NAMED_UNIT(Derived) SI_UNIT(prefix, METRE);
    radian() = NAMED_UNIT(Derived) PLANE_ANGLE_UNIT() SI_UNIT(None::<Enumeration>, Enumeration("RADIAN"));
    steradian() = NAMED_UNIT(Derived) SI_UNIT(None::<Enumeration>, Enumeration("STERADIAN")) SOLID_ANGLE_UNIT();
    exponents(length: f64) = DIMENSIONAL_EXPONENTS(length, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0);
    length_with_unit(value: f64, unit: Id) = LENGTH_MEASURE_WITH_UNIT(Typed("LENGTH_MEASURE", value), unit);
    angle_with_unit(value: f64, unit: Id) = PLANE_ANGLE_MEASURE_WITH_UNIT(Typed("PLANE_ANGLE_MEASURE", value), unit);
    length_unit(name: &str, factor: Id, exponents: Id) = CONVERSION_BASED_UNIT(name, factor) LENGTH_UNIT() NAMED_UNIT(exponents);
    angle_unit(name: &str, factor: Id, exponents: Id) = CONVERSION_BASED_UNIT(name, factor) NAMED_UNIT(exponents) PLANE_ANGLE_UNIT();
    unit_power(unit: Id, exponent: f64) = DERIVED_UNIT_ELEMENT(unit, exponent);
    derived_unit(element: Id) = DERIVED_UNIT([element]);
    uncertainty(value: f64, unit: Id) = UNCERTAINTY_MEASURE_WITH_UNIT(Typed("LENGTH_MEASURE", value), unit, "distance_accuracy_value", "confusion accuracy");
    geometric_context(uncertainty: Id, units: [Id; 3]) = GEOMETRIC_REPRESENTATION_CONTEXT(3_usize) GLOBAL_UNCERTAINTY_ASSIGNED_CONTEXT([uncertainty]) GLOBAL_UNIT_ASSIGNED_CONTEXT(units) REPRESENTATION_CONTEXT("", "3D");

    // geometry
    cartesian_point(name: &str, coordinates: [f64; 3]) = CARTESIAN_POINT(name, coordinates);
    direction(ratios: [f64; 3]) = DIRECTION("", ratios);
    unit_vector(direction: Id) = VECTOR("", direction, 1.0);
    placement(origin: Id, z: Id, x: Id) = AXIS2_PLACEMENT_3D("", origin, z, x);
    line(point: Id, vector: Id) = LINE("", point, vector);
    trimmed_curve(name: &str, basis: Id, start: Trim, end: Trim) = TRIMMED_CURVE(name, basis, start, end, true, Enumeration("CARTESIAN"));
    curve(degree: usize, points: &[Id], knots: Knots<'_>) = B_SPLINE_CURVE_WITH_KNOTS("", degree, points, UNSPECIFIED, false, false, knots.0, knots.1, UNSPECIFIED);
    rational_curve(degree: usize, points: &[Id], knots: Knots<'_>, weights: &[f64]) = BOUNDED_CURVE() B_SPLINE_CURVE(degree, points, UNSPECIFIED, false, false) B_SPLINE_CURVE_WITH_KNOTS(knots.0, knots.1, UNSPECIFIED) CURVE() GEOMETRIC_REPRESENTATION_ITEM() RATIONAL_B_SPLINE_CURVE(weights) REPRESENTATION_ITEM("");
    plane(placement: Id) = PLANE("", placement);
    surface(degrees: (usize, usize), net: &[Vec<Id>], u: Knots<'_>, v: Knots<'_>) = B_SPLINE_SURFACE_WITH_KNOTS("", degrees.0, degrees.1, net, UNSPECIFIED, false, false, false, u.0, v.0, u.1, v.1, UNSPECIFIED);
    rational_surface(degrees: (usize, usize), net: &[Vec<Id>], u: Knots<'_>, v: Knots<'_>, weights: &[Vec<f64>]) = BOUNDED_SURFACE() B_SPLINE_SURFACE(degrees.0, degrees.1, net, UNSPECIFIED, false, false, false) B_SPLINE_SURFACE_WITH_KNOTS(u.0, v.0, u.1, v.1, UNSPECIFIED) GEOMETRIC_REPRESENTATION_ITEM() RATIONAL_B_SPLINE_SURFACE(weights) REPRESENTATION_ITEM("") SURFACE();

    // topology
    vertex_point(point: Id) = VERTEX_POINT("", point);
    edge_curve(start: Id, end: Id, curve: Id) = EDGE_CURVE("", start, end, curve, true);
    oriented_edge(edge: Id, forward: bool) = ORIENTED_EDGE("", Derived, Derived, edge, forward);
    edge_loop(edges: &[Id]) = EDGE_LOOP("", edges);
    outer_bound(edges: Id) = FACE_OUTER_BOUND("", edges, true);
    inner_bound(edges: Id) = FACE_BOUND("", edges, true);
    face(name: &str, bounds: &[Id], surface: Id, same_sense: bool) = ADVANCED_FACE(name, bounds, surface, same_sense);
    closed_shell(faces: &[Id]) = CLOSED_SHELL("", faces);
    solid(name: &str, shell: Id) = MANIFOLD_SOLID_BREP(name, shell);
    curve_set(name: &str, items: &[Id]) = GEOMETRIC_CURVE_SET(name, items);

    // representations
    solid_representation(name: &str, items: [Id; 2], context: Id) = ADVANCED_BREP_SHAPE_REPRESENTATION(name, items, context);
    shape_representation(name: &str, items: &[Id], context: Id) = SHAPE_REPRESENTATION(name, items, context);
    wireframe_representation(name: &str, items: &[Id], context: Id) = GEOMETRICALLY_BOUNDED_WIREFRAME_SHAPE_REPRESENTATION(name, items, context);
    construction_representation(name: &str, items: &[Id], context: Id) = CONSTRUCTIVE_GEOMETRY_REPRESENTATION(name, items, context);
    construction_of(name: &str, shape: Id, construction: Id) = CONSTRUCTIVE_GEOMETRY_REPRESENTATION_RELATIONSHIP(name, "", shape, construction);
    wireframe_of(name: &str, shape: Id, wireframe: Id) = SHAPE_REPRESENTATION_RELATIONSHIP(name, "", shape, wireframe);
    representation(name: &str, items: &[Id], context: Id) = REPRESENTATION(name, items, context);

    // properties
    property(name: &str, description: &str, of: Id) = PROPERTY_DEFINITION(name, description, of);
    property_representation(property: Id, representation: Id) = PROPERTY_DEFINITION_REPRESENTATION(property, representation);
    general_property(name: &str) = GENERAL_PROPERTY("", name, "");
    general_property_of(general: Id, property: Id) = GENERAL_PROPERTY_ASSOCIATION("", "", general, property);
    measure_item(name: &str, value: Measure, unit: Id) = MEASURE_REPRESENTATION_ITEM(name, value, unit);
    real_item(name: &str, value: f64) = REAL_REPRESENTATION_ITEM(name, value);
    value_item(name: &str, value: Measure) = VALUE_REPRESENTATION_ITEM(name, value);
    text_item(name: &str, text: &str) = DESCRIPTIVE_REPRESENTATION_ITEM(name, text);

    // presentation
    colour(rgb: [f64; 3]) = COLOUR_RGB("", rgb[0], rgb[1], rgb[2]);
    fill_colour(colour: Id) = FILL_AREA_STYLE_COLOUR("", colour);
    fill_style(colour: Id) = FILL_AREA_STYLE("", [colour]);
    fill_area(style: Id) = SURFACE_STYLE_FILL_AREA(style);
    side_style(area: Id) = SURFACE_SIDE_STYLE("", [area]);
    surface_style(side: Id) = SURFACE_STYLE_USAGE(Enumeration("BOTH"), side);
    curve_font(name: &str) = DRAUGHTING_PRE_DEFINED_CURVE_FONT(name);
    curve_style(font: Id, width: f64, colour: Id) = CURVE_STYLE("", font, Typed("POSITIVE_LENGTH_MEASURE", width), colour);
    point_style(size: f64, colour: Id) = POINT_STYLE("", Typed("MARKER_TYPE", Enumeration("PLUS")), Typed("POSITIVE_LENGTH_MEASURE", size), colour);
    style_assignment(style: Id) = PRESENTATION_STYLE_ASSIGNMENT([style]);
    styled_item(name: &str, style: Id, item: Id) = STYLED_ITEM(name, [style], item);
    presentation(items: &[Id], context: Id) = MECHANICAL_DESIGN_GEOMETRIC_PRESENTATION_REPRESENTATION("", items, context);
    layer(name: &str, description: &str, items: &[Id]) = PRESENTATION_LAYER_ASSIGNMENT(name, description, items);
}

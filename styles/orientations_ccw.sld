<?xml version="1.0" encoding="UTF-8"?>
<!-- For renderers that turn graphics counter-clockwise; otherwise the same as orientations.sld. Draw the layer in its own CRS: the rotations hold for no other. -->
<StyledLayerDescriptor version="1.0.0" xmlns="http://www.opengis.net/sld" xmlns:ogc="http://www.opengis.net/ogc" xmlns:xlink="http://www.w3.org/1999/xlink">
 <NamedLayer>
  <Name>orientations</Name>
  <UserStyle>
   <Name>orientations</Name>
   <Title>Orientations</Title>
   <FeatureTypeStyle>
    <Rule>
     <Name>02.15.01</Name>
     <Title>minor fault, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>02.15.01</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/02.15.01.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>02.15.02</Name>
     <Title>minor fault, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>02.15.02</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/02.15.02.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>04.03.01</Name>
     <Title>joint, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>04.03.01</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/04.03.01.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>04.03.02</Name>
     <Title>joint, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>04.03.02</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/04.03.02.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>04.03.03</Name>
     <Title>joint, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>04.03.03</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/04.03.03.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>06.01</Name>
     <Title>bedding, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>06.01</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/06.01.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>06.02</Name>
     <Title>bedding, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>06.02</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/06.02.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>06.03</Name>
     <Title>bedding, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>06.03</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/06.03.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>06.04</Name>
     <Title>bedding, overturned</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>06.04</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/06.04.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>06.13</Name>
     <Title>bedding, inclined, tops known: upright</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>06.13</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/06.13.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>06.15</Name>
     <Title>bedding, overturned, tops known</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>06.15</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/06.15.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>07.01</Name>
     <Title>cleavage, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>07.01</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/07.01.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>07.02</Name>
     <Title>cleavage, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>07.02</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/07.02.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>07.03</Name>
     <Title>cleavage, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>07.03</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/07.03.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>08.02.02</Name>
     <Title>igneous foliation, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>08.02.02</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/08.02.02.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>08.02.03</Name>
     <Title>igneous foliation, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>08.02.03</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/08.02.03.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>08.02.04</Name>
     <Title>igneous foliation, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>08.02.04</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/08.02.04.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>08.03.01</Name>
     <Title>metamorphic or tectonic foliation, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>08.03.01</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/08.03.01.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>08.03.02</Name>
     <Title>metamorphic or tectonic foliation, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>08.03.02</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/08.03.02.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>08.03.03</Name>
     <Title>metamorphic or tectonic foliation, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>08.03.03</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/08.03.03.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>09.001_east</Name>
     <Title>lineation, inclined, to the east</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>09.001</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsLessThan>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsLessThan>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.001.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>1</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>-3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>09.001_west</Name>
     <Title>lineation, inclined, to the west</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>09.001</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsGreaterThanOrEqualTo>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsGreaterThanOrEqualTo>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.001.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>09.005</Name>
     <Title>lineation, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>09.005</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.005.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>09.007</Name>
     <Title>lineation, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>09.007</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.007.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>09.017_east</Name>
     <Title>slickenline, inclined, to the east</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>09.017</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsLessThan>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsLessThan>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.017.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>1</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>-3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>09.017_west</Name>
     <Title>slickenline, inclined, to the west</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>09.017</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsGreaterThanOrEqualTo>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsGreaterThanOrEqualTo>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.017.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>09.019</Name>
     <Title>slickenline, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>09.019</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.019.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>09.097_east</Name>
     <Title>axis of a small fold, inclined, to the east</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>09.097</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsLessThan>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsLessThan>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.097.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>1</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>-3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>09.097_west</Name>
     <Title>axis of a small fold, inclined, to the west</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>09.097</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsGreaterThanOrEqualTo>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsGreaterThanOrEqualTo>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/09.097.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>planar</Name>
     <Title>plane of another kind, inclined</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>planar</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/planar.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>10</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>planar_horizontal</Name>
     <Title>plane of another kind, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>planar_horizontal</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/planar_horizontal.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>planar_vertical</Name>
     <Title>plane of another kind, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>planar_vertical</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/planar_vertical.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>linear_east</Name>
     <Title>line of another kind, inclined, to the east</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>linear</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsLessThan>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsLessThan>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/linear.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>1</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>-3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>linear_west</Name>
     <Title>line of another kind, inclined, to the west</Title>
     <ogc:Filter>
      <ogc:And>
       <ogc:PropertyIsEqualTo>
        <ogc:PropertyName>symbol</ogc:PropertyName>
        <ogc:Literal>linear</ogc:Literal>
       </ogc:PropertyIsEqualTo>
       <ogc:PropertyIsGreaterThanOrEqualTo>
        <ogc:PropertyName>rotation_grid</ogc:PropertyName>
        <ogc:Literal>180</ogc:Literal>
       </ogc:PropertyIsGreaterThanOrEqualTo>
      </ogc:And>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/linear.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
     <TextSymbolizer>
      <Label>
       <ogc:PropertyName>label</ogc:PropertyName>
      </Label>
      <Font>
       <CssParameter name="font-family">sans</CssParameter>
       <CssParameter name="font-size">8</CssParameter>
      </Font>
      <LabelPlacement>
       <PointPlacement>
        <AnchorPoint>
         <AnchorPointX>0</AnchorPointX>
         <AnchorPointY>0.5</AnchorPointY>
        </AnchorPoint>
        <Displacement>
         <DisplacementX>3</DisplacementX>
         <DisplacementY>0</DisplacementY>
        </Displacement>
       </PointPlacement>
      </LabelPlacement>
      <Fill>
       <CssParameter name="fill">#000000</CssParameter>
      </Fill>
     </TextSymbolizer>
    </Rule>
    <Rule>
     <Name>linear_horizontal</Name>
     <Title>line of another kind, horizontal</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>linear_horizontal</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/linear_horizontal.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
       <Rotation>
        <ogc:PropertyName>rotation_ccw</ogc:PropertyName>
       </Rotation>
      </Graphic>
     </PointSymbolizer>
    </Rule>
    <Rule>
     <Name>linear_vertical</Name>
     <Title>line of another kind, vertical</Title>
     <ogc:Filter>
      <ogc:PropertyIsEqualTo>
       <ogc:PropertyName>symbol</ogc:PropertyName>
       <ogc:Literal>linear_vertical</ogc:Literal>
      </ogc:PropertyIsEqualTo>
     </ogc:Filter>
     <PointSymbolizer>
      <Graphic>
       <ExternalGraphic>
        <OnlineResource xlink:type="simple" xlink:href="symbols/linear_vertical.svg"/>
        <Format>image/svg+xml</Format>
       </ExternalGraphic>
       <Size>50</Size>
      </Graphic>
     </PointSymbolizer>
    </Rule>
   </FeatureTypeStyle>
  </UserStyle>
 </NamedLayer>
</StyledLayerDescriptor>
